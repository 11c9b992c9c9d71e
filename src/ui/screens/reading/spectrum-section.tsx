import { useMemo, useState } from 'preact/hooks';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { AnalysisPictures } from '../../../core/model/pictures.ts';
import type { AxisName } from '../../../core/model/recording.ts';
import { formatNumber } from '../../../text/number.ts';
import { toUnit } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { LineChart } from '../../charts/line-chart.tsx';
import type { PlotMark, PlotSpec } from '../../charts/plot-spec.ts';
import { Button } from '../../components/button.tsx';
import { axisSeries } from './axis-series.ts';
import { saidHz, saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import { Section } from './section.tsx';
import { SeriesToggles } from './series-legend.tsx';
import { useHiddenLines } from './use-hidden-lines.ts';

interface SpectrumProps {
  readonly analysis: Analysis;
  readonly pictures: AnalysisPictures;
  readonly units: ReadingUnits;
  readonly axes: readonly AxisName[];
}

/** Decades below the largest amplitude that a logarithmic axis shows. */
const DECADES = 4;

const marksOf = (analysis: Analysis, units: ReadingUnits): PlotMark[] => [
  ...analysis.modes.map((mode) => ({
    at: toUnit(mode.frequencyHz, units.frequency),
    label: saidHz(units, mode.frequencyHz, mode.frequencySdHz).replace(/ ±.*/, ''),
    colour: '--chart-fit' as const,
  })),
  ...analysis.tones.slice(0, 6).map((tone) => ({
    at: toUnit(tone.frequencyHz, units.frequency),
    label: saidHz(units, tone.frequencyHz),
    colour: '--chart-source' as const,
    isDashed: true,
  })),
];

const largestOf = (axes: readonly ArrayLike<number>[], from: number): { value: number; index: number } => {
  let best = { value: 0, index: from };
  for (const axis of axes)
    for (let i = from; i < axis.length; i += 1)
      if (axis[i]! > best.value) best = { value: axis[i]!, index: i };
  return best;
};

/** Amplitude against frequency, one line an axis, modes and tones marked, what could not be seen hatched. */
export function SpectrumSection({ analysis, pictures, units, axes }: SpectrumProps) {
  const words = readingText.spectrum;
  const [isLog, setLog] = useState(true);
  const { spectrum } = pictures;
  const { stepHz, amplitudeMps2, resolutionHz } = spectrum;
  const first = Math.max(1, Math.ceil(0.3 / stepHz));
  const largest = useMemo(() => largestOf(amplitudeMps2, first), [amplitudeMps2, first]);
  const { hidden, toggle } = useHiddenLines();
  const spec = useMemo((): PlotSpec => {
    const count = amplitudeMps2[0]?.length ?? 0;
    const per = toUnit(1, units.frequency);
    const x = Float64Array.from({ length: Math.max(0, count - 1) }, (_, i) => (i + 1) * stepHz * per);
    const scale = toUnit(1, units.acceleration);
    const end = (count - 1) * stepHz * per;
    const [low, high] = analysis.recording.usableBandHz.map((hz) => hz * per) as [number, number];
    return {
      x,
      xLabel: words.x(units.frequency),
      wholeX: [0, end],
      yLabel: words.y(units.acceleration),
      isLogY: isLog,
      floorY: (largest.value * scale) / 10 ** DECADES,
      series: axisSeries(
        axes,
        amplitudeMps2.map((axis) => axis.subarray(1)),
        scale,
      ),
      marks: marksOf(analysis, units),
      shades: [
        [0, low],
        [high, end],
      ],
    };
  }, [amplitudeMps2, stepHz, units, analysis, axes, isLog, largest]);

  const pointText = (index: number): string =>
    `${saidHz(units, (index + 1) * stepHz)}: ${axes
      .map((name, i) => `${name} ${saidMps2(units, amplitudeMps2[i]?.[index + 1] ?? 0)}`)
      .join(', ')}`;
  const at = (frequencyHz: number): string => {
    const index = Math.round(frequencyHz / stepHz);
    return saidMps2(units, Math.max(0, ...amplitudeMps2.map((axis) => axis[index] ?? 0)));
  };
  return (
    <Section
      title={words.title}
      aside={
        <Button
          kind="quiet"
          pressed={isLog}
          label={`${words.scale}: ${words.log}`}
          onClick={() => setLog(!isLog)}
        >
          {isLog ? words.log : words.linear}
        </Button>
      }
    >
      <SeriesToggles series={spec.series} hidden={hidden} onToggle={toggle} />
      <LineChart
        name={words.title}
        sentence={words.sentence(
          `${saidHz(units, largest.index * stepHz)}, ${saidMps2(units, largest.value)}`,
          saidHz(units, resolutionHz),
        )}
        spec={spec}
        hidden={hidden}
        words={readingText.plots}
        pointText={pointText}
        table={{
          summary: readingText.plots.numbers,
          head: words.head,
          rows: [
            ...analysis.modes.map((mode) => [
              saidHz(units, mode.frequencyHz, mode.frequencySdHz),
              at(mode.frequencyHz),
              words.mode,
            ]),
            ...analysis.tones.map((tone) => [
              saidHz(units, tone.frequencyHz, tone.frequencySdHz),
              at(tone.frequencyHz),
              words.tone,
            ]),
          ],
        }}
      />
      <p class="note">
        {words.note(
          spectrum.window,
          `${formatNumber(toUnit(resolutionHz, units.frequency), 2)} ${units.frequency}`,
          words.averages(String(Number(spectrum.averageCount.toPrecision(2)))),
        )}
      </p>
    </Section>
  );
}
