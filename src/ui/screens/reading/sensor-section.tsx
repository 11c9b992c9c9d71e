import type { Analysis } from '../../../core/model/analysis.ts';
import type { ReadingFact } from '../../../core/model/fact.ts';
import { interruptionSentence } from '../../../text/interruptions.ts';
import { formatNumber } from '../../../text/number.ts';
import { formatFrequencyRange, formatPercent } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { FactRows } from './fact-rows.tsx';
import { saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import { Section } from './section.tsx';

/** What the sensor delivered, measured on the recording itself, never what the browser claimed. */
export function SensorSection(props: {
  readonly reading: ReadingFact;
  readonly analysis: Analysis;
  readonly units: ReadingUnits;
}) {
  const { reading, analysis, units } = props;
  const words = readingText.sensor;
  const { recording } = analysis;
  const { timing } = recording;
  const step = Math.max(0, ...recording.stepMps2);
  const noise = recording.noiseMps2PerRootHz.map((value) => formatNumber(value * 1000, 2)).join(', ');
  const ended = reading.sensor.interruption;
  return (
    <Section title={words.title} isFolded>
      <FactRows
        rows={[
          [words.rows.source, words.sources[reading.sensor.source]],
          [words.rows.samples, String(recording.sampleCount)],
          [words.rows.duration, `${formatNumber(recording.durationS, 3)} s`],
          [words.rows.rate, `${formatNumber(recording.rateHz, 4)} Hz`],
          [words.rows.timing, words.timing(timing.model)],
          [
            words.rows.scatter,
            `${formatNumber(timing.scatterSdS * 1000, 2)} ms, ${words.trueShare(formatPercent(timing.trueShare))}`,
          ],
          [words.rows.gaps, String(timing.gapCount)],
          [words.rows.repeats, String(timing.repeatCount)],
          [words.rows.step, step === 0 ? words.noStep : saidMps2(units, step)],
          [words.rows.noise, `${noise} mm/s² per √Hz`],
          [words.rows.clipped, String(recording.clippedCount)],
          [words.rows.band, formatFrequencyRange(recording.usableBandHz, units.frequency)],
          [
            words.rows.gravity,
            recording.gravityMps2 === undefined
              ? undefined
              : `${formatNumber(recording.gravityMps2, 4)} m/s²`,
          ],
          [words.rows.ended, ended ? interruptionSentence(ended) : words.wholeRecording],
          [words.rows.phone, reading.phone.userAgent],
        ]}
      />
    </Section>
  );
}
