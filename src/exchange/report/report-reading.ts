/** One reading of a report: what it means in plain words, the ladder, what to do. */
import type { ReportReading, ReportUnits } from '../../app/ports.ts';
import type { WayOut } from '../../core/model/judgement.ts';
import { allDoubts } from '../../text/all-doubts.ts';
import { doubtText } from '../../text/doubts.ts';
import { criterionName, levelSentence } from '../../text/levels.ts';
import { formatDamping, formatFrequencyRange, formatVelocity } from '../../text/quantity.ts';
import { readingKind, readingText } from '../../text/reading-screen.ts';
import { saidHz, saidMps2 } from '../../text/reading-units.ts';
import { reportText as words } from '../../text/report.ts';
import { headlinePair, headlineSentence, sourcesSentence } from '../../text/sentence.ts';
import { forcingName } from '../../text/sources.ts';
import { SPECIALIST_HEADING, specialistText } from '../../text/specialist.ts';
import { likelyDampingRatio, likelyHz } from '../../text/true-frequency.ts';
import { verdictWord } from '../../text/verdicts.ts';
import { wayOutName, wayOutSentence } from '../../text/ways-out.ts';
import { html, type Html } from './html.ts';
import { chartSvg } from './report-charts.ts';
import { engineeringDetail } from './report-detail.ts';
import {
  chartFigure,
  factRows,
  figure,
  sentenceCase,
  times,
  titled,
  together,
  verdictMark,
} from './report-parts.ts';
import { photoFigures } from './report-photos.ts';
import { whenText } from './report-when.ts';

export const readingSheet = (of: ReportReading, units: ReportUnits): Html => html`
  <article class="reading">
    ${sheetHead(of)} ${sentences(of, units)} ${specialist(of)}
    <div class="two">
      ${chartFigure(chartSvg(of, units, 'ladder'), words.ladder, words.ladderNote, 'ladder')}
      <div class="beside">
        ${photoFigures(of, 0, 1)} ${titled(words.found, found(of, units))} ${titled(words.doubts, doubts(of))}
      </div>
    </div>
    ${waysOut(of, units)} ${levels(of, units)}
    ${of.notes ? titled(words.notes, html`<p class="typed">${of.notes}</p>`) : undefined}
    ${photoFigures(of, 1, Infinity)} ${engineeringDetail(of, units)}
  </article>
`;

/** Where it was taken, the nearest name first. */
export const placeTitle = ({ names, label }: ReportReading): string =>
  names.spot ?? label ?? names.asset ?? words.noSpot;

function sheetHead(of: ReportReading): Html {
  const { reading, analysis, names, label } = of;
  const around = [names.site, names.spot ? names.asset : undefined].filter((name) => name !== undefined);
  return html`<header>
    <p class="over">${around.join(' · ')}</p>
    <h2>${placeTitle(of)} ${names.spot && label ? html`<small>${label}</small>` : undefined}</h2>
    <p class="quiet">${whenText(reading.recordedAt, reading.timeZone)} · ${readingKind(analysis)}</p>
    ${reading.practice ? html`<p class="practice">${words.practice}</p>` : undefined}
  </header>`;
}

/** The sentence before the picture. */
export function sentences(of: ReportReading, units: ReportUnits): Html {
  const { analysis, judgement } = of;
  const pair = headlinePair(judgement.separations);
  // The mark says the verdict's word already.
  const driven = sourcesSentence(analysis, judgement)?.replace(/: \w+\.$/, '.');
  return html`<p class="sentence">
      ${together(headlineSentence(analysis, { frequencyUnit: units.frequency }))}
    </p>
    <p class="driven">
      ${
        pair
          ? html`<b class="${pair.verdict}"
              >${verdictMark(pair.verdict)} ${sentenceCase(verdictWord(pair.verdict))}.</b
            >`
          : undefined
      }
      ${driven ?? words.noSources} <span class="trust">${words.trust[judgement.trust]}.</span>
    </p>`;
}

function specialist({ judgement }: ReportReading): Html | undefined {
  if (judgement.specialist.length === 0) return undefined;
  return html`<aside class="specialist">
    <h3>${SPECIALIST_HEADING}</h3>
    ${judgement.specialist.map((reason) => html`<p>${specialistText(reason)}</p>`)}
  </aside>`;
}

function found({ analysis, judgement }: ReportReading, units: ReportUnits): Html {
  const modes = analysis.modes.map((mode, index): Html => {
    const worst = judgement.separations.find(({ modeIndex }) => modeIndex === index);
    const amplified = worst && worst.verdict !== 'apart' && worst.verdict !== 'blind';
    const isSaid = mode.fold.verdict !== 'undecided';
    return html`<li>
      <b>${figure(mode.frequencyHz, saidHz(units, likelyHz(mode), mode.frequencySdHz))}</b>
      ${
        isSaid
          ? html`<span
              >${words.damping} ${formatDamping(likelyDampingRatio(mode), mode.dampingRatioSd)}</span
            >`
          : html`<span>${readingText.fold(mode.fold.verdict)}</span>`
      }
      ${worst ? html`<span class="${worst.verdict}">${verdictMark(worst.verdict)} ${verdictWord(worst.verdict)}</span>` : undefined}
      ${amplified ? html`<span>${words.amplification} ${times(worst.amplification.interval)}</span>` : undefined}
    </li>`;
  });
  const tones = analysis.procedure === 'tap' ? [] : analysis.tones.slice(0, modes.length > 0 ? 2 : 4);
  const lines = tones.map(
    (tone): Html =>
      html`<li>
        <b>${figure(tone.frequencyHz, saidHz(units, likelyHz(tone), tone.frequencySdHz))}</b>
        <span>${saidMps2(units, tone.amplitudeMps2, tone.amplitudeSdMps2)}</span>
      </li>`,
  );
  if (modes.length + lines.length === 0)
    return html`<p>${readingText.noMode[analysis.procedure].meaning}</p>`;
  return html`<ul class="found">
    ${modes}${lines}
  </ul>`;
}

function doubts({ analysis, judgement }: ReportReading): Html {
  const all = allDoubts(analysis, judgement).map((doubt) => doubtText(doubt));
  if (all.length === 0) return html`<p>${words.noDoubts}</p>`;
  return html`<ul class="doubts">
    ${all.map(({ name, meaning, remedy }) => html`<li><b>${name}.</b> ${meaning} <i>${remedy}</i></li>`)}
  </ul>`;
}

/** Ways out are printed for so many pairs, worst first; the rest differ too little. */
const MOST_PAIRS = 2;

function waysOut({ judgement }: ReportReading, units: ReportUnits): Html | undefined {
  const pairs = [...new Set(judgement.waysOut.map((way) => way.separationIndex))].slice(0, MOST_PAIRS);
  if (pairs.length === 0) return undefined;
  const of = (index: number) => judgement.waysOut.filter((way) => way.separationIndex === index);
  const row = (way: WayOut) =>
    html`<li class="${way.practical ? '' : 'hard'}">
      <b>${wayOutName(way.kind)}</b>
      <span class="${way.verdictAfter}"
        >${verdictMark(way.verdictAfter)} ${verdictWord(way.verdictAfter)}</span
      >
      <p>${wayOutSentence(way, judgement)}</p>
    </li>`;
  const pair = (index: number): Html => {
    const separation = judgement.separations[index];
    const forcing = separation && judgement.forcings[separation.forcingIndex];
    const name = forcing && readingText.pair.against(forcingName(forcing), saidHz(units, separation.modeHz));
    return html`<h5>${name ? sentenceCase(name) : undefined}</h5>
      <ul class="ways">
        ${of(index).map(row)}
      </ul>`;
  };
  return titled(words.waysOut, pairs.map(pair));
}

function levels({ analysis, judgement }: ReportReading, units: ReportUnits): Html | undefined {
  const { levels: level, procedure } = analysis;
  // Blows of the hand say nothing of service.
  if (level === undefined || procedure === 'tap') return undefined;
  const text = readingText.levels;
  const velocity = (mps: number | undefined) =>
    mps === undefined ? undefined : figure(mps, formatVelocity(mps, undefined, units.velocity));
  return titled(words.levels, [
    factRows([
      [text.peak, figure(level.peakMps2, saidMps2(units, level.peakMps2))],
      [text.rms, figure(level.rmsMps2, saidMps2(units, level.rmsMps2))],
      [text.velocityRms, velocity(level.velocityRmsMps)],
      [text.velocityPeak, velocity(level.velocityPeakMps)],
    ]),
    html`<p class="quiet">
      ${text.band(formatFrequencyRange(level.bandHz, units.frequency))}
      ${level.leftOutTones ? text.leftOut : ''}
    </p>`,
    html`<ul class="levels">
      ${judgement.levels.map((finding) => {
        const name = criterionName(finding.criterion);
        return html`<li><b>${name}</b> ${levelSentence(finding).replace(`${name}: `, '')}</li>`;
      })}
    </ul>`,
  ]);
}
