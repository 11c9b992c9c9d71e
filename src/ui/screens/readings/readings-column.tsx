import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { screenText } from '../../../text/screens.ts';
import { TextField } from '../../components/field.tsx';
import { Rows } from '../../components/rows.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { usePlaceNames } from './place-names.ts';
import { ReadingRow } from './reading-row.tsx';
import { useShownCount } from './use-shown-count.ts';

/** Readings beside the open one, on a laptop. */
export function ReadingsColumn({ app, current }: { readonly app: App; readonly current?: string }) {
  const names = usePlaceNames(app);
  const [search, setSearch] = useState('');
  const readings = useLoaded(
    app.store,
    () => app.readings.list(search.trim() ? { text: search.trim() } : {}),
    [search],
  );
  const { shown, sentinel } = useShownCount(readings?.length ?? 0, search);
  return (
    <nav class="stack" aria-label={screenText.readings.title}>
      <div class="row row-apart">
        <h2>{screenText.readings.title}</h2>
        <a href={app.navigation.href({ screen: 'readings' })}>{screenText.readings.select}</a>
      </div>
      <TextField type="search" label={screenText.readings.search} value={search} onInput={setSearch} />
      <Rows>
        {readings?.slice(0, shown).map((reading) => (
          <ReadingRow
            key={reading.id}
            names={names}
            app={app}
            reading={reading}
            isCurrent={reading.id === current}
          />
        ))}
      </Rows>
      <div ref={sentinel} />
    </nav>
  );
}
