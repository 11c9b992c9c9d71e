import { useMemo } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { Later } from '../../later.tsx';
import { useLive } from '../../use-live.ts';
import { readingLinks, readingUseCases } from './app-cases.ts';
import { ReadingPage } from './reading-page.tsx';
import type { ReadingUnits } from '../../../text/reading-units.ts';

/** One kept reading: verdict first, then the picture, then the numbers. Loaded when the first reading is opened. */
export function ReadingScreen({ id, app }: { readonly id: string; readonly app: App }) {
  const settings = useLive(app.settings);
  const cases = useMemo(() => readingUseCases(app), [app]);
  const links = useMemo(() => readingLinks(app), [app]);
  const { frequencyUnit, accelerationUnit, velocityUnit, displacementUnit } = settings;
  const units = useMemo(
    (): ReadingUnits => ({
      frequency: frequencyUnit,
      acceleration: accelerationUnit,
      velocity: velocityUnit,
      displacement: displacementUnit,
    }),
    [frequencyUnit, accelerationUnit, velocityUnit, displacementUnit],
  );
  const spotDialog = (reading: string, onClose: () => void) => (
    <Later load={() => import('../assets/pick-spot-dialog.tsx')}>
      {({ PickSpotDialog }) => (
        <PickSpotDialog
          app={app}
          onClose={onClose}
          onPick={(where) => {
            onClose();
            void app.readings.setSpot([reading], where);
          }}
        />
      )}
    </Later>
  );
  return <ReadingPage key={id} id={id} cases={cases} links={links} units={units} spotDialog={spotDialog} />;
}
