import { useMemo, useState } from 'preact/hooks';
import type { Interval } from '../../../core/model/interval.ts';
import type { RingDown } from '../../../core/model/pictures.ts';
import { formatNumber } from '../../../text/number.ts';
import { formatPercent, toUnit } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { LineChart } from '../../charts/line-chart.tsx';
import type { PlotSeries, PlotSpec } from '../../charts/plot-spec.ts';
import { saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
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
  /** Times of the decay's x axis on the recording's own axis. */
  readonly times: readonly number[];
  readonly decay: PlotSpec;
  readonly residual: PlotSpec;
}

/** The smooth curve and the samples on one ascending time axis; NaN where one of them has nothing. */
function mergedTimes(ringDown: RingDown): { timeS: number[]; curve: number[]; measured: number[] } {
  const { timeS, measuredMps2, fittedMps2, curveTimeS, curveMps2 } = ringDown;
  if (!curveTimeS || !curveMps2)
    return { timeS: [...timeS], curve: [...fittedMps2], measured: [...measuredMps2] };
  const samples = Array.from(timeS, (at, i) => ({
    at,
    curve: fittedMps2[i] ?? NaN,
    measured: measuredMps2[i] ?? NaN,
  }));
  const between = Array.from(curveTimeS, (at, i) => ({ at, curve: curveMps2[i] ?? NaN, measured: NaN }));
  const all = [...samples, ...between].sort((a, b) => a.at - b.at);
  return {
    timeS: all.map((point) => point.at),
    curve: all.map((point) => point.curve),
    measured: all.map((point) => point.measured),
  };
}

function specsOf(ringDown: RingDown, units: ReadingUnits): Specs {
  const words = readingText.ringDown;
  const scale = toUnit(1, units.acceleration);
  const scaled = (values: readonly number[]) => values.map((value) => value * scale);
  const merged = mergedTimes(ringDown);
  const sinceTap = (time: number) => time - ringDown.tapTimeS;
  const x = ringDown.timeS.map(sinceTap);
  const wholeX: Interval = [0, x.at(-1) ?? 1];
  const values = [...merged.curve, ...merged.measured].filter((value) => !Number.isNaN(value));
  const reach = 1.06 * Math.max(1e-9, ...scaled(values).map(Math.abs));
  const common = { xLabel: words.x, wholeX, marks: [], shades: [] };
  const fitted: PlotSeries = {
    label: words.fitted,
    values: scaled(merged.curve),
    colour: '--chart-fit',
    kind: 'line',
  };
  const measured: PlotSeries = {
    label: words.measured,
    values: scaled(merged.measured),
    colour: '--chart-z',
    kind: 'dots',
  };
  const residual: PlotSeries = {
    label: words.residual,
    values: scaled([...residualOf(ringDown)]),
    colour: '--chart-residual',
    kind: 'line',
  };
  return {
    times: merged.timeS,
    decay: {
      ...common,
      x: merged.timeS.map(sinceTap),
      yLabel: words.y(units.acceleration),
      rangeY: [-reach, reach],
      series: [fitted, measured],
    },
    // the same scale, a quarter of the height: what is left is seen against what was there
    residual: { ...common, x, yLabel: words.residualY, rangeY: [-reach / 4, reach / 4], series: [residual] },
  };
}

/** What stands at a place of the merged axis, in words. */
const decayText = (ringDown: RingDown, specs: Specs, units: ReadingUnits, index: number): string => {
  const words = readingText.ringDown;
  const per = toUnit(1, units.acceleration);
  const [fitted, measured] = specs.decay.series;
  const value = measured?.values[index] ?? NaN;
  const head = `${formatNumber((specs.times[index] ?? 0) - ringDown.tapTimeS, 3)} s`;
  const curve = `${words.fitted} ${saidMps2(units, (fitted?.values[index] ?? 0) / per)}`;
  return Number.isNaN(value)
    ? `${head}: ${curve}`
    : `${head}: ${words.measured} ${saidMps2(units, value / per)}, ${curve}`;
};

const peakOf = ({ measuredMps2 }: RingDown): number => Math.max(0, ...measuredMps2.map(Math.abs));

/** The ring-down to begin with: the one that stands highest above the noise. */
const strongestOf = (ringDowns: readonly RingDown[]): number =>
  ringDowns.reduce((best, one, i) => (peakOf(one) > peakOf(ringDowns[best]!) ? i : best), 0);

/** One ring-down at a time: measured points over the fitted curve, and below it what the fit leaves. */
export function RingDownSection(props: {
  readonly ringDowns: readonly RingDown[];
  readonly units: ReadingUnits;
}) {
  const { ringDowns, units } = props;
  const words = readingText.ringDown;
  const [chosen, setChosen] = useState(() => strongestOf(ringDowns));
  const [range, setRange] = useState<Interval | undefined>();
  const index = Math.min(chosen, ringDowns.length - 1);
  const ringDown = ringDowns[index]!;
  const specs = useMemo(() => specsOf(ringDown, units), [ringDown, units]);
  const residualRms = saidMps2(units, rmsOf(residualOf(ringDown)));
  const peak = saidMps2(units, peakOf(ringDown));
  const choose = (next: number) => {
    setChosen(next);
    setRange(undefined);
  };
  const pointText = (i: number) => decayText(ringDown, specs, units, i);
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
          isFollower
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
          table={{
            summary: readingText.plots.numbers,
            head: words.head,
            rows: ringDowns.map((one, i) => [
              String(i + 1),
              `${formatNumber(one.tapTimeS, 3)} s`,
              saidMps2(units, peakOf(one)),
              saidMps2(units, rmsOf(residualOf(one))),
              formatPercent(explainedShare(one), 3),
            ]),
          }}
        />
      </div>
    </Section>
  );
}
