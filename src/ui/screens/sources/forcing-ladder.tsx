import { useMemo } from 'preact/hooks';
import type { Forcing } from '../../../core/model/source.ts';
import type { LadderContent } from '../../../core/picture/ladder-content.ts';
import { formatFrequencyRange } from '../../../text/quantity.ts';
import { officeText } from '../../../text/office-screens.ts';
import { forcingName, forcingOrigin } from '../../../text/sources.ts';
import { Ladder } from '../../charts/ladder.tsx';

const text = officeText.sources;

/** The forcings of one source on a small ladder, with the same in a list: name, band, and where the numbers come from. */
export function ForcingLadder({ forcings }: { readonly forcings: readonly Forcing[] }) {
  const content = useMemo<LadderContent>(
    () => ({
      modes: [],
      tones: [],
      broadPeaks: [],
      forcings: forcings.map((forcing, index) => ({
        id: String(index),
        label: forcing.label,
        frequencyHz: forcing.frequencyHz,
      })),
      words: text.ladder.content,
    }),
    [forcings],
  );
  return (
    <section class="stack">
      <h2>{text.forcings(forcings.length)}</h2>
      <Ladder
        content={content}
        sentence={text.ladder.sentence(forcings.length)}
        words={text.ladder.words}
        heightPx={280}
      />
      <ul class="stack stack-tight">
        {forcings.map((forcing, index) => (
          <li key={index}>
            {forcingName(forcing)}: <strong>{formatFrequencyRange(forcing.frequencyHz)}</strong>{' '}
            <span class="note">{forcingOrigin(forcing)}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
