import { useState } from 'preact/hooks';
import type { Judgement } from '../../../core/model/judgement.ts';
import { presumedLoading } from '../../../text/levels.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { Button } from '../../components/button.tsx';
import { CheckField } from '../../components/field.tsx';
import { Later } from '../../later.tsx';
import type { ReadingUseCases, ReadingView } from './reading-use-cases.ts';

interface Asked {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
  readonly judgement: Judgement;
}

/** What the criteria still need to know, asked where it is missing and answered in a tap or two. */
export function LevelQuestions({ view, cases, judgement }: Asked) {
  const { reading, spotId, spotPlace } = view;
  const words = readingText.levels;
  if (reading.analysis.procedure !== 'running' && reading.analysis.procedure !== 'ambient') return null;
  if (!spotId) return <p class="note">{words.noSpot}</p>;
  const isClassOpen = judgement.levels.some(({ reasons }) => reasons.includes('class-unknown'));
  const loadings = judgement.levels.map(({ criterion }) => presumedLoading(criterion));
  const presumed = [...new Set(loadings)].filter((loading) => loading !== undefined);
  return (
    <>
      {isClassOpen && <ClassQuestion view={view} cases={cases} />}
      {presumed.length > 0 && (
        <CheckField
          label={
            <>
              {words.wasLoaded}. <span class="note">{presumed.join(' ')}</span>
            </>
          }
          checked={spotPlace?.presumedLoading ?? false}
          onChange={(wasLoaded) => void cases.edit(reading._id, { presumedLoading: wasLoaded })}
        />
      )}
    </>
  );
}

function ClassQuestion({ view, cases }: Omit<Asked, 'judgement'>) {
  const [isOpen, setOpen] = useState(false);
  const { spotId, spotPlace } = view;
  if (!spotId || !spotPlace) return null;
  return (
    <div class="row no-print">
      <p class="note">{readingText.levels.noClass}</p>
      <Button onClick={() => setOpen(true)}>{readingText.levels.sayClass}</Button>
      {isOpen && (
        <Later load={() => import('../assets/spot-class-dialog.tsx')}>
          {({ SpotClassDialog }) => (
            <SpotClassDialog
              place={spotPlace}
              onClose={() => setOpen(false)}
              onSave={(fields) => {
                setOpen(false);
                void cases.edit(spotId, fields);
              }}
            />
          )}
        </Later>
      )}
    </div>
  );
}
