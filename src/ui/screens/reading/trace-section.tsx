import { useMemo } from 'preact/hooks';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { AnalysisPictures } from '../../../core/model/pictures.ts';
import type { AxisName } from '../../../core/model/recording.ts';
import { formatNumber } from '../../../text/number.ts';
import { toUnit } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { LineChart } from '../../charts/line-chart.tsx';
import type { PlotSpec } from '../../charts/plot-spec.ts';
import { axisSeries } from './axis-series.ts';
import { saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import { Section } from './section.tsx';
import { SeriesToggles } from './series-legend.tsx';
import { useHiddenLines } from './use-hidden-lines.ts';

const largestOf = (values: ArrayLike<number>): number => {
  let largest = 0;
  for (let i = 0; i < values.length; i += 1) largest = Math.max(largest, Math.abs(values[i]!));
  return largest;
};
export const rmsOf = (values: ArrayLike<number>): number => {
  let sum = 0;
  for (let i = 0; i < values.length; i += 1) sum += values[i]! * values[i]!;
  return values.length === 0 ? 0 : Math.sqrt(sum / values.length);
};

/** The recording itself: acceleration of each axis against time, taps marked. */
export function TraceSection(props: {
  readonly analysis: Analysis;
  readonly pictures: AnalysisPictures;
  readonly units: ReadingUnits;
  readonly axes: readonly AxisName[];
}) {
  const { analysis, pictures, units, axes } = props;
  const words = readingText.trace;
  const { timeS, accelerationMps2 } = pictures.trace;
  const { hidden, toggle } = useHiddenLines();
  const spec = useMemo(
    (): PlotSpec => ({
      x: timeS,
      xLabel: words.x,
      wholeX: [timeS[0] ?? 0, timeS.at(-1) ?? 1],
      yLabel: words.y(units.acceleration),
      // the weaker axes over the stronger ones, so that none is hidden
      series: axisSeries(axes, accelerationMps2, toUnit(1, units.acceleration), true).sort(
        (a, b) => rmsOf(b.values) - rmsOf(a.values),
      ),
      marks: analysis.tapTimesS.map((at, index) => ({
        at,
        label: String(index + 1),
        colour: '--chart-fit',
        isDashed: true,
      })),
      shades: [],
    }),
    [timeS, accelerationMps2, axes, units, analysis.tapTimesS],
  );
  const inOrder = [...spec.series].sort((a, b) => a.label.localeCompare(b.label));
  const peak = Math.max(0, ...accelerationMps2.map(largestOf));
  return (
    <Section title={words.title}>
      <SeriesToggles series={inOrder} hidden={hidden} onToggle={toggle} />
      <LineChart
        name={words.title}
        sentence={words.sentence(
          `${formatNumber(analysis.recording.durationS, 3)} s`,
          saidMps2(units, peak),
          analysis.tapTimesS.length,
        )}
        spec={spec}
        hidden={hidden}
        words={readingText.plots}
        pointText={(index) =>
          `${formatNumber(timeS[index] ?? 0, 4)} s: ${axes
            .map((name, i) => `${name} ${saidMps2(units, accelerationMps2[i]?.[index] ?? 0)}`)
            .join(', ')}`
        }
        table={{
          summary: readingText.plots.numbers,
          head: words.head,
          rows: axes.map((name, i) => [
            name,
            saidMps2(units, largestOf(accelerationMps2[i] ?? [])),
            saidMps2(units, rmsOf(accelerationMps2[i] ?? [])),
          ]),
        }}
      />
    </Section>
  );
}
