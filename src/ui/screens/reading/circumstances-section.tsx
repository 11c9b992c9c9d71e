import type { Circumstances } from '../../../core/model/fact.ts';
import { formatNumber } from '../../../text/number.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { FactRows } from './fact-rows.tsx';
import { Section } from './section.tsx';

/** How it was taken: what a colleague needs to take it again in the same way. */
export function CircumstancesSection({ circumstances }: { readonly circumstances: Circumstances }) {
  const { rows, words, unknown, title } = readingText.circumstances;
  const word = (value: string) => words[value] ?? unknown;
  return (
    <Section title={title} isFolded>
      <FactRows
        rows={[
          [rows.mounting, word(circumstances.mounting)],
          [rows.surface, word(circumstances.surface)],
          [rows.excitation, word(circumstances.excitation)],
          [rows.machineState, word(circumstances.machineState)],
          [rows.peopleOnIt, word(circumstances.peopleOnIt)],
          [rows.direction, circumstances.direction],
          [rows.load, circumstances.load],
          [
            rows.temperatureC,
            circumstances.temperatureC === undefined
              ? undefined
              : `${formatNumber(circumstances.temperatureC, 2)} °C`,
          ],
          [
            rows.speedRpm,
            circumstances.speedRpm === undefined ? undefined : `${Math.round(circumstances.speedRpm)} r/min`,
          ],
        ]}
      />
    </Section>
  );
}
