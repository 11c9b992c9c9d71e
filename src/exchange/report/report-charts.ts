import type { Chart, ReportReading, ReportUnits } from '../../app/ports.ts';
import type { AnalysisPictures, RingDown } from '../../core/model/pictures.ts';
import { ladderSvg } from '../../core/picture/ladder-svg.ts';
import { lineSvg, type LineSvgContent } from '../../core/picture/line-svg.ts';
import { ladderSentence } from '../../text/ladder-sentence.ts';
import { formatNumber } from '../../text/number.ts';
import { toUnit } from '../../text/quantity.ts';
import { readingLadder } from '../../text/reading-ladder.ts';
import { readingText } from '../../text/reading-screen.ts';
import { saidHz, saidMps2 } from '../../text/reading-units.ts';
import { reportText } from '../../text/report.ts';

/** Points of a plot: more than a printer resolves over the width of a page would only make the file larger. */
const MOST_POINTS = 900;
const DECADES = 4;
const LADDER = { widthPx: 420, heightPx: 470, textPx: 11.5 };
const PLOT = { widthPx: 430, heightPx: 240, textPx: 11.5 };

/** A chart of the reading as an SVG element in one ink, or undefined where it has none. */
export function chartSvg(of: ReportReading, units: ReportUnits, chart: Chart): string | undefined {
  if (chart === 'ladder') return readingLadderSvg(of, units);
  if (of.pictures === undefined) return undefined;
  if (chart === 'spectrum') return spectrumSvg(of, of.pictures, units);
  return of.pictures.pass ? passSvg(of.pictures.pass, units) : ringDownSvg(of.pictures, units);
}

const readingLadderSvg = ({ analysis, judgement }: ReportReading, units: ReportUnits): string =>
  ladderSvg(
    readingLadder(analysis, judgement, units),
    { ...LADDER, shownPerHz: toUnit(1, units.frequency) },
    ladderSentence(analysis, judgement, units),
  );

function spectrumSvg(of: ReportReading, pictures: AnalysisPictures, units: ReportUnits): string | undefined {
  const { stepHz, amplitudeMps2, resolutionHz } = pictures.spectrum;
  const length = amplitudeMps2[0]?.length ?? 0;
  const first = Math.max(1, Math.ceil(0.3 / stepHz));
  if (length <= first + 1) return undefined;
  const width = Math.max(1, Math.ceil((length - first) / MOST_POINTS));
  const x: number[] = [];
  const values: number[] = [];
  let best = { value: 0, atHz: 0 };
  for (let from = first; from < length; from += width) {
    const peak = largestIn(amplitudeMps2, from, Math.min(length, from + width));
    x.push(toUnit(peak.index * stepHz, units.frequency));
    values.push(toUnit(peak.value, units.acceleration));
    if (peak.value > best.value) best = { value: peak.value, atHz: peak.index * stepHz };
  }
  const { modes, tones } = of.analysis;
  const marked = [...modes, ...tones.slice(0, 4)].map(({ frequencyHz }) => ({
    at: toUnit(frequencyHz, units.frequency),
    label: formatNumber(toUnit(frequencyHz, units.frequency), 3),
  }));
  const words = readingText.spectrum;
  return lineSvg(
    {
      x,
      xLabel: words.x(units.frequency),
      yLabel: words.y(units.acceleration),
      series: [{ label: reportText.spectrum, values, kind: 'line' }],
      marks: readable(marked, (x.at(-1) ?? 1) - (x[0] ?? 0)),
      decades: DECADES,
    },
    PLOT,
    words.sentence(
      `${saidHz(units, best.atHz)}, ${saidMps2(units, best.value)}`,
      saidHz(units, resolutionHz),
    ),
  );
}

/** Labels that would stand on each other are left out; the first in the list is the stronger. */
function readable(marks: LineSvgContent['marks'], span: number): LineSvgContent['marks'] {
  const kept: { at: number; label: string }[] = [];
  for (const mark of marks) {
    const isFree = kept.every((other) => Math.abs(other.at - mark.at) > span / 18 || other.label === '');
    kept.push(isFree ? mark : { at: mark.at, label: '' });
  }
  return kept;
}

function largestIn(
  axes: readonly Float64Array[],
  from: number,
  to: number,
): { readonly value: number; readonly index: number } {
  let best = { value: 0, index: from };
  for (const axis of axes)
    for (let i = from; i < to; i += 1) if (axis[i]! > best.value) best = { value: axis[i]!, index: i };
  return best;
}

const peakOf = (values: ArrayLike<number>): number =>
  Array.from(values).reduce((peak, value) => Math.max(peak, Math.abs(value)), 0);

function ringDownSvg({ ringDowns }: AnalysisPictures, units: ReportUnits): string | undefined {
  const shown = [...ringDowns].sort((a, b) => peakOf(b.measuredMps2) - peakOf(a.measuredMps2))[0];
  if (shown === undefined) return undefined;
  const words = readingText.ringDown;
  const since = (timeS: Float64Array) => timeS.map((time) => time - shown.tapTimeS);
  const scaled = (values: Float64Array) => values.map((value) => toUnit(value, units.acceleration));
  return lineSvg(
    {
      x: since(shown.timeS),
      xLabel: words.x,
      yLabel: words.y(units.acceleration),
      series: [
        {
          label: words.fitted,
          values: scaled(shown.curveMps2 ?? shown.fittedMps2),
          x: since(shown.curveMps2 && shown.curveTimeS ? shown.curveTimeS : shown.timeS),
          kind: 'line',
        },
        { label: words.measured, values: scaled(shown.measuredMps2), kind: 'dots' },
      ],
      marks: [],
    },
    PLOT,
    words.sentence(
      ringDowns.indexOf(shown) + 1,
      saidMps2(units, peakOf(shown.measuredMps2)),
      saidMps2(units, residualRms(shown)),
    ),
  );
}

function residualRms({ measuredMps2, fittedMps2 }: RingDown): number {
  const squares = measuredMps2.map((value, i) => (value - (fittedMps2[i] ?? 0)) ** 2);
  return Math.sqrt(squares.reduce((sum, value) => sum + value, 0) / Math.max(1, squares.length));
}

function passSvg(pass: NonNullable<AnalysisPictures['pass']>, units: ReportUnits): string {
  const order = Array.from(pass.frequencyHz, (_, i) => i).sort(
    (a, b) => pass.frequencyHz[a]! - pass.frequencyHz[b]!,
  );
  const scaled = (values: Float64Array) => order.map((i) => toUnit(values[i]!, units.acceleration));
  const x = order.map((i) => toUnit(pass.frequencyHz[i]!, units.frequency));
  const words = readingText.pass;
  const top = order.reduce((best, i) => (pass.measuredMps2[i]! > pass.measuredMps2[best]! ? i : best), 0);
  return lineSvg(
    {
      x,
      xLabel: readingText.spectrum.x(units.frequency),
      yLabel: readingText.spectrum.y(units.acceleration),
      series: [
        { label: words.fitted, values: scaled(pass.fittedMps2), kind: 'line' },
        { label: words.measured, values: scaled(pass.measuredMps2), kind: 'dots' },
      ],
      marks: [],
    },
    PLOT,
    words.sentence(
      saidHz(units, pass.frequencyHz[0] ?? 0),
      saidHz(units, pass.frequencyHz.at(-1) ?? 0),
      `${saidHz(units, pass.frequencyHz[top] ?? 0)}, ${saidMps2(units, pass.measuredMps2[top] ?? 0)}`,
    ),
  );
}
