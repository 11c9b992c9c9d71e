/** Where readings are kept, how safe that is, and how to get a copy out. */
import type { App } from '../../../app/app.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { formatNumber } from '../../../text/number.ts';
import { Button, LinkButton } from '../../components/button.tsx';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { FactList } from './fact-list.tsx';
import { useState } from 'preact/hooks';

const text = officeText.phone.storage;

export function StoragePart({ app }: { readonly app: App }) {
  const offline = useLive(app.update.state);
  const [asked, setAsked] = useState(0);
  const facts = useLoaded(
    app.store,
    async () => ({
      persistence: await app.store.persistence(),
      usageBytes: await app.store.usageBytes(),
      count: (await app.readings.list()).length,
      trashed: (await app.readings.list({ trashed: true })).length,
    }),
    [asked],
  );
  const ask = () => void app.store.askPersistence().then(() => setAsked((count) => count + 1));
  const switchOffline = () => {
    const isOff = offline === 'off';
    app.settings.change({ offline: isOff ? 'on' : 'off' });
    void (isOff ? app.update.switchOn() : app.update.switchOff());
  };
  return (
    <>
      {facts && (
        <FactList
          facts={[
            [text.readings, String(facts.count)],
            [text.inTrash, String(facts.trashed)],
            [
              text.used,
              facts.usageBytes === undefined ? '–' : `${formatNumber(facts.usageBytes / 1e6, 2)} MB`,
            ],
            [text.persistence, text.persistences[facts.persistence]],
            [text.offline, text.offlines[offline]],
          ]}
        />
      )}
      <p class="quiet">{text.note}</p>
      <p class="quiet">{text.homeScreen}</p>
      <div class="row">
        <LinkButton kind="main" href={app.navigation.href({ screen: 'hand-over' })}>
          {text.backUp}
        </LinkButton>
        {facts && facts.persistence !== 'granted' && <Button onClick={ask}>{text.ask}</Button>}
        {facts && facts.trashed > 0 && (
          <LinkButton href={app.navigation.href({ screen: 'readings', trashed: true })}>
            {screenText.readings.openTrash}
          </LinkButton>
        )}
      </div>
      {offline !== 'unsupported' && (
        <section class="stack">
          <h2>{text.worker}</h2>
          <p class="note">{text.workerNote}</p>
          <div class="row">
            <Button onClick={switchOffline}>{offline === 'off' ? text.switchOn : text.switchOff}</Button>
          </div>
        </section>
      )}
    </>
  );
}
