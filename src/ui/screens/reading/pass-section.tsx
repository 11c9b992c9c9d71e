import { useMemo } from 'preact/hooks';
import type { CoastdownFacts } from '../../../core/model/analysis.ts';
import type { AnalysisPictures } from '../../../core/model/pictures.ts';
import { formatNumber } from '../../../text/number.ts';
import { toUnit } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { LineChart } from '../../charts/line-chart.tsx';
import type { PlotSeries, PlotSpec } from '../../charts/plot-spec.ts';
import { saidHz, saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import { Section } from './section.tsx';
import { SeriesLegend } from './series-legend.tsx';

const ROWS = 12;

/** Amplitude along a coast-down against frequency, with the fitted response, and whether it passed too fast. */
export function PassSection(props: {
  readonly pass: NonNullable<AnalysisPictures['pass']>;
  readonly coastdown: CoastdownFacts;
  readonly units: ReadingUnits;
}) {
  const { pass, coastdown, units } = props;
  const words = readingText.pass;
  const spec = useMemo((): PlotSpec => {
    const per = toUnit(1, units.frequency);
    const scale = toUnit(1, units.acceleration);
    const order = Array.from(pass.frequencyHz, (_, i) => i).sort(
      (a, b) => pass.frequencyHz[a]! - pass.frequencyHz[b]!,
    );
    const taken = (values: Float64Array, by: number) => order.map((i) => values[i]! * by);
    const x = taken(pass.frequencyHz, per);
    const series: PlotSeries[] = [
      { label: words.fitted, values: taken(pass.fittedMps2, scale), colour: '--chart-fit', kind: 'line' },
      { label: words.measured, values: taken(pass.measuredMps2, scale), colour: '--chart-z', kind: 'dots' },
    ];
    return {
      x,
      xLabel: readingText.spectrum.x(units.frequency),
      wholeX: [x[0] ?? 0, x.at(-1) ?? 1],
      yLabel: readingText.spectrum.y(units.acceleration),
      series,
      marks: [],
      shades: [],
    };
  }, [pass, units]);
  const [fitted, measured] = spec.series;
  const peakAt = Array.from(spec.x, (_, i) => i).reduce(
    (best, i) => (measured!.values[i]! > measured!.values[best]! ? i : best),
    0,
  );
  const hzAt = (i: number) => saidHz(units, (spec.x[i] ?? 0) / toUnit(1, units.frequency));
  const mps2At = (series: PlotSeries | undefined, i: number) =>
    saidMps2(units, (series?.values[i] ?? 0) / toUnit(1, units.acceleration));
  const step = Math.max(1, Math.floor(spec.x.length / ROWS));
  return (
    <Section title={words.title}>
      <SeriesLegend series={spec.series} />
      <LineChart
        name={words.title}
        sentence={words.sentence(
          saidHz(units, coastdown.startHz),
          saidHz(units, coastdown.endHz),
          hzAt(peakAt),
        )}
        spec={spec}
        words={readingText.plots}
        pointText={(i) =>
          `${hzAt(i)}: ${words.measured} ${mps2At(measured, i)}, ${words.fitted} ${mps2At(fitted, i)}`
        }
        table={{
          summary: readingText.plots.numbers,
          head: words.head,
          rows: Array.from(spec.x, (_, i) => i)
            .filter((i) => i % step === 0)
            .map((i) => [hzAt(i), mps2At(measured, i), mps2At(fitted, i)]),
        }}
      />
      <p class="note">
        {words.sweep(
          `${formatNumber(Math.abs(coastdown.sweepRateHzPerS), 2)} Hz/s`,
          `${formatNumber(coastdown.sweepSeverityRatio, 2)} times`,
        )}{' '}
        {coastdown.sweepSeverityRatio > 1 ? words.fast : words.slow}
      </p>
    </Section>
  );
}
