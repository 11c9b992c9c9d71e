/** The engineer's half of a reading: every number with its ±, where limits and frequencies come from, how it was measured. */
import type { ReportReading, ReportUnits } from '../../app/ports.ts';
import type { DampingCheck } from '../../core/model/analysis.ts';
import { interruptionSentence } from '../../text/interruptions.ts';
import { formatInterval, formatNumber } from '../../text/number.ts';
import { formatDamping, formatFrequencyRange, formatPercent } from '../../text/quantity.ts';
import { readingText } from '../../text/reading-screen.ts';
import { saidHz, saidMps2 } from '../../text/reading-units.ts';
import { refusalSentence } from '../../text/refusals.ts';
import { reportText as words } from '../../text/report.ts';
import { forcingName, forcingOrigin } from '../../text/sources.ts';
import { unpairedText, verdictWord } from '../../text/verdicts.ts';
import { html, type Html } from './html.ts';
import { chartSvg } from './report-charts.ts';
import {
  chartFigure,
  factRows,
  figure,
  sentenceCase,
  table,
  tight,
  times,
  titled,
  verdictMark,
} from './report-parts.ts';
import { whenText } from './report-when.ts';

export const engineeringDetail = (of: ReportReading, units: ReportUnits): Html => html`
  <section class="detail">
    <h3>${words.detail}</h3>
    ${modeTable(of, units)} ${toneTable(of, units)} ${pairTable(of, units)} ${unpairedRows(of, units)}
    <div class="plots">
      ${chartFigure(chartSvg(of, units, 'spectrum'), words.spectrum, words.spectrumNote, 'plot')}
      ${
        of.pictures?.pass
          ? chartFigure(chartSvg(of, units, 'ring-down'), words.pass, words.passNote, 'plot')
          : chartFigure(chartSvg(of, units, 'ring-down'), words.ringDown, words.ringDownNote, 'plot')
      }
    </div>
    <div class="columns">
      <div>
        ${titled(words.circumstances, circumstances(of))} ${titled(words.check, phoneCheck(of, units))}
      </div>
      <div>${titled(words.sensor, sensor(of, units))}</div>
    </div>
    ${titled(words.method, html`<p>${words.methodOf(of.analysis.procedure)}</p>`)}
    ${titled(words.provenance, provenance(of))}
  </section>
`;

const checkText = (check: DampingCheck | undefined): string =>
  check === undefined
    ? ''
    : 'refusal' in check
      ? refusalSentence(check.refusal)
      : formatPercent(check.dampingRatio);

function modeTable({ analysis }: ReportReading, units: ReportUnits): Html | undefined {
  if (analysis.modes.length === 0) return undefined;
  const rows = analysis.modes.map((mode, index) => [
    String(index + 1),
    html`${tight(figure(mode.frequencyHz, saidHz(units, mode.frequencyHz, mode.frequencySdHz)))}
      <data hidden value="${mode.frequencySdHz}"></data>`,
    html`${tight(figure(mode.dampingRatio, formatDamping(mode.dampingRatio, mode.dampingRatioSd)))}
      <data hidden value="${mode.dampingRatioSd}"></data>`,
    tight(figure(mode.amplitudeMps2, saidMps2(units, mode.amplitudeMps2))),
    mode.verticalShare === undefined ? readingText.directionUnknown : formatPercent(mode.verticalShare),
    html`${words.halfPower}
    ${checkText(mode.halfPower)}${mode.logDecrement ? html`<br />${words.logDecrement} ${checkText(mode.logDecrement)}` : undefined}`,
    mode.fold.verdict === 'direct'
      ? readingText.fold('direct')
      : `${readingText.fold(mode.fold.verdict)}; ${readingText.candidates(mode.fold.candidatesHz.map((hz) => saidHz(units, hz)).join(', '))}`,
    readingText.method(mode.method),
  ]);
  return titled(words.modes, table(words.modeHead, rows));
}

function toneTable({ analysis, judgement }: ReportReading, units: ReportUnits): Html | undefined {
  if (analysis.tones.length === 0) return undefined;
  const fits = (index: number): string => {
    const match = judgement.toneMatches.find((entry) => entry.toneIndex === index);
    if (!match?.forcing) return readingText.noMatch;
    const name = forcingName(match.forcing);
    return match.folded ? readingText.foldedImageOf(name) : name;
  };
  const rows = analysis.tones.map((tone, index) => [
    String(index + 1),
    tight(figure(tone.frequencyHz, saidHz(units, tone.frequencyHz, tone.frequencySdHz))),
    tight(figure(tone.amplitudeMps2, saidMps2(units, tone.amplitudeMps2, tone.amplitudeSdMps2))),
    fits(index),
    readingText.fold(tone.fold.verdict),
  ]);
  return titled(words.tones, table(words.toneHead, rows));
}

/** Pairs that are simply apart are printed up to this row; the ladder has all of them. */
const MOST_ROWS = 14;

function pairTable({ judgement }: ReportReading, units: ReportUnits): Html | undefined {
  const { separations, forcings } = judgement;
  if (separations.length === 0) return undefined;
  const shown = separations.filter(({ verdict }, index) => verdict !== 'apart' || index < MOST_ROWS);
  const rows = shown.map((separation) => {
    const forcing = forcings[separation.forcingIndex];
    const { interval, kind } = separation.amplification;
    const stopped = separation.stoppedAgainstRunning ? ` ${readingText.pair.stopped}` : '';
    return [
      html`<span class="${separation.verdict}"
        >${verdictMark(separation.verdict)} ${verdictWord(separation.verdict)}</span
      >`,
      forcing ? sentenceCase(forcingName(forcing)) : separation.source,
      forcing
        ? `${formatFrequencyRange(forcing.frequencyHz, units.frequency)}, ${forcingOrigin(forcing)}.${stopped}`
        : '',
      tight(saidHz(units, separation.modeHz)),
      tight(formatInterval(separation.ratio, 3)),
      `${readingText.pair.amplified(kind)} ${times(interval)}${separation.buildUpLimited ? `, ${readingText.pair.limited}` : ''}`,
    ];
  });
  const left = separations.length - shown.length;
  return titled(words.pairs, [
    table(words.pairHead, rows),
    html`${left > 0 ? html`<p class="quiet">${words.morePairs(left)}</p>` : undefined}`,
  ]);
}

function unpairedRows({ judgement }: ReportReading, units: ReportUnits): Html | undefined {
  if (judgement.unpaired.length === 0) return undefined;
  const rows = judgement.unpaired.map(
    ({ forcing, verdict }) =>
      [
        `${sentenceCase(forcingName(forcing))}, ${formatFrequencyRange(forcing.frequencyHz, units.frequency)}`,
        html`${verdict === 'blind' ? verdictMark('blind') : undefined} ${unpairedText(verdict).word}`,
      ] as const,
  );
  return titled(words.unpaired, factRows(rows));
}

function circumstances({ reading }: ReportReading): Html {
  const { rows, words: known, unknown } = readingText.circumstances;
  const { circumstances: given } = reading;
  const word = (value: string) => known[value] ?? unknown;
  return factRows([
    [rows.mounting, word(given.mounting)],
    [rows.surface, word(given.surface)],
    [rows.excitation, word(given.excitation)],
    [rows.machineState, word(given.machineState)],
    [rows.peopleOnIt, word(given.peopleOnIt)],
    [rows.direction, given.direction],
    [rows.load, given.load],
    [
      rows.temperatureC,
      given.temperatureC === undefined ? undefined : `${formatNumber(given.temperatureC, 2)} °C`,
    ],
    [rows.speedRpm, given.speedRpm === undefined ? undefined : `${Math.round(given.speedRpm)} r/min`],
  ]);
}

function sensor({ reading, analysis }: ReportReading, units: ReportUnits): Html {
  const { recording } = analysis;
  const { timing } = recording;
  const { rows, sources, timing: timingText, trueShare, wholeRecording, noStep } = readingText.sensor;
  const step = Math.max(0, ...recording.stepMps2);
  const noise = recording.noiseMps2PerRootHz.map((value) => formatNumber(value * 1000, 2)).join(', ');
  const ended = reading.sensor.interruption;
  return factRows([
    [rows.source, sources[reading.sensor.source]],
    [rows.phone, reading.phone.userAgent],
    [rows.samples, figure(recording.sampleCount, String(recording.sampleCount))],
    [rows.duration, figure(recording.durationS, `${formatNumber(recording.durationS, 3)} s`)],
    [rows.rate, figure(recording.rateHz, `${formatNumber(recording.rateHz, 4)} Hz`)],
    [rows.timing, timingText(timing.model)],
    [
      rows.scatter,
      `${formatNumber(timing.scatterSdS * 1000, 2)} ms, ${trueShare(formatPercent(timing.trueShare))}`,
    ],
    [rows.gaps, String(timing.gapCount)],
    [rows.repeats, String(timing.repeatCount)],
    [rows.step, step === 0 ? noStep : saidMps2(units, step)],
    [rows.noise, `${noise} mm/s² per √Hz`],
    [rows.clipped, String(recording.clippedCount)],
    [rows.band, formatFrequencyRange(recording.usableBandHz, units.frequency)],
    [
      rows.gravity,
      recording.gravityMps2 === undefined ? undefined : `${formatNumber(recording.gravityMps2, 4)} m/s²`,
    ],
    [rows.ended, ended ? interruptionSentence(ended) : wholeRecording],
  ]);
}

function phoneCheck({ reading }: ReportReading, units: ReportUnits): Html {
  const { check } = reading.phone;
  if (check === undefined) return html`<p>${words.noCheck}</p>`;
  const { checkRows } = words;
  return factRows([
    [checkRows.at, whenText(check.checkedAt, reading.timeZone)],
    [checkRows.rate, `${formatNumber(check.rateHz, 4)} Hz`],
    [checkRows.sees, formatFrequencyRange(check.usableBandHz, units.frequency)],
    [checkRows.smallest, saidMps2(units, check.smallestToneMps2)],
    [checkRows.gravity, `${formatNumber(check.gravityMps2, 4)} m/s²`],
  ]);
}

function provenance({ reading, analysis, redoneAt }: ReportReading): Html {
  const rows = words.provenanceRows;
  const { settings } = analysis;
  return factRows([
    [rows.id, html`<code>${reading._id}</code>`],
    [rows.recorded, `${reading.recordedAt}, ${reading.timeZone}`],
    [rows.samples, html`<code>${reading.rawSha256}</code>`],
    [rows.analysis, words.analysisMade(analysis.version, redoneAt && whenText(redoneAt, reading.timeZone))],
    [rows.settings, `${settings.procedure}, ${settings.timing}`],
    [rows.app, `Thrumbook ${reading.app.version} (${reading.app.commit})`],
  ]);
}
