import { useMemo, useState } from 'preact/hooks';
import type { Interval } from '../../../core/model/interval.ts';
import type { RingDown } from '../../../core/model/pictures.ts';
import { formatNumber } from '../../../text/number.ts';
import { formatPercent, toUnit } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { LineChart } from '../../charts/line-chart.tsx';
import type { PlotSeries, PlotSpec } from '../../charts/plot-spec.ts';
import { saidMps2, type ReadingUnits } from './reading-units.ts';
import styles from './ring-down-section.module.css';
import { Section } from './section.tsx';
import { SeriesLegend } from './series-legend.tsx';
import { rmsOf } from './trace-section.tsx';

const residualOf = ({ measuredMps2, fittedMps2 }: RingDown): Float64Array =>
  measuredMps2.map((value, i) => value - (fittedMps2[i] ?? 0));

/** Share of the measured power that the fit explains. */
const explainedShare = (ringDown: RingDown): number => {
  const measured = rmsOf(ringDown.measuredMps2);
  return measured === 0 ? 0 : Math.max(0, 1 - (rmsOf(residualOf(ringDown)) / measured) ** 2);
};

interface Specs {
  readonly decay: PlotSpec;
  readonly residual: PlotSpec;
}

function specsOf(ringDown: RingDown, units: ReadingUnits): Specs {
  const words = readingText.ringDown;
  const scale = toUnit(1, units.acceleration);
  const scaled = (values: Float64Array) => values.map((value) => value * scale);
  const x = ringDown.timeS.map((time) => time - ringDown.tapTimeS);
  const wholeX: Interval = [0, x.at(-1) ?? 1];
  const reach =
    1.06 *
    Math.max(
      1e-9,
      ...scaled(ringDown.measuredMps2).map(Math.abs),
      ...scaled(ringDown.fittedMps2).map(Math.abs),
    );
  const common = { x, xLabel: words.x, wholeX, marks: [], shades: [] };
  const fitted: PlotSeries = {
    label: words.fitted,
    values: scaled(ringDown.fittedMps2),
    colour: '--chart-fit',
    kind: 'line',
  };
  const measured: PlotSeries = {
    label: words.measured,
    values: scaled(ringDown.measuredMps2),
    colour: '--chart-z',
    kind: 'dots',
  };
  const residual: PlotSeries = {
    label: words.residual,
    values: scaled(residualOf(ringDown)),
    colour: '--chart-residual',
    kind: 'line',
  };
  return {
    decay: {
      ...common,
      yLabel: words.y(units.acceleration),
      rangeY: [-reach, reach],
      series: [fitted, measured],
    },
    // the same scale, a quarter of the height: what is left is seen against what was there
    residual: { ...common, yLabel: words.residualY, rangeY: [-reach / 4, reach / 4], series: [residual] },
  };
}

/** One ring-down at a time: measured points over the fitted curve, and below it what the fit leaves. */
export function RingDownSection(props: {
  readonly ringDowns: readonly RingDown[];
  readonly units: ReadingUnits;
}) {
  const { ringDowns, units } = props;
  const words = readingText.ringDown;
  const [chosen, setChosen] = useState(0);
  const [range, setRange] = useState<Interval | undefined>();
  const index = Math.min(chosen, ringDowns.length - 1);
  const ringDown = ringDowns[index]!;
  const specs = useMemo(() => specsOf(ringDown, units), [ringDown, units]);
  const residualRms = saidMps2(units, rmsOf(residualOf(ringDown)));
  const peak = saidMps2(units, Math.max(0, ...ringDown.measuredMps2.map(Math.abs)));
  const choose = (next: number) => {
    setChosen(next);
    setRange(undefined);
  };
  const pointText = (i: number) =>
    `${formatNumber((ringDown.timeS[i] ?? 0) - ringDown.tapTimeS, 3)} s: ${words.measured} ${saidMps2(units, ringDown.measuredMps2[i] ?? 0)}, ${words.fitted} ${saidMps2(units, ringDown.fittedMps2[i] ?? 0)}`;
  return (
    <Section title={words.title}>
      {ringDowns.length > 1 && (
        <div class={styles.taps} role="group" aria-label={words.choose}>
          {ringDowns.map((one, i) => (
            <button
              key={i}
              type="button"
              aria-pressed={i === index}
              aria-label={words.tapName(i + 1, `${formatNumber(one.tapTimeS, 3)} s`)}
              onClick={() => choose(i)}
            >
              {i + 1}
            </button>
          ))}
        </div>
      )}
      <SeriesLegend series={[...specs.decay.series, ...specs.residual.series]} />
      <div>
        <LineChart
          name={words.name(index + 1)}
          sentence={words.sentence(index + 1, peak, residualRms)}
          spec={specs.decay}
          words={readingText.plots}
          pointText={pointText}
          heightPx={220}
          range={range}
          onRange={setRange}
        />
        <LineChart
          name={words.residualName(index + 1)}
          sentence={words.residualSentence(residualRms)}
          spec={specs.residual}
          words={readingText.plots}
          pointText={(i) => `${words.residual} ${saidMps2(units, residualOf(ringDown)[i] ?? 0)}`}
          heightPx={120}
          range={range}
          onRange={setRange}
          isFollower
          table={{
            summary: readingText.plots.numbers,
            head: words.head,
            rows: ringDowns.map((one, i) => [
              String(i + 1),
              `${formatNumber(one.tapTimeS, 3)} s`,
              saidMps2(units, Math.max(0, ...one.measuredMps2.map(Math.abs))),
              saidMps2(units, rmsOf(residualOf(one))),
              formatPercent(explainedShare(one), 3),
            ]),
          }}
        />
      </div>
    </Section>
  );
}
