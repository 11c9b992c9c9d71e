/** The whole page: front, one sheet a reading, a foot that every printed page repeats. Nothing in it loads or runs anything. */
import type { ReportContent, ReportReading, ReportUnits } from '../../app/ports.ts';
import type { TableReading } from '../../core/packet/packet-readings-table.ts';
import { INDICATIVE_LINE } from '../../text/indicative.ts';
import { cautionText } from '../../text/cautions.ts';
import { PLUS_MINUS_NOTE } from '../../text/number.ts';
import { reportText as words } from '../../text/report.ts';
import { headlinePair, headlineSentence, trustWord, verdictSentence } from '../../text/sentence.ts';
import { SPECIALIST_HEADING } from '../../text/specialist.ts';
import { html, type Html } from './html.ts';
import { sentenceCase, table, together, verdictMark } from './report-parts.ts';
import { placeTitle, readingSheet } from './report-reading.ts';
import { REPORT_CSS } from './report-style.ts';
import { whenText } from './report-when.ts';

export interface ReportFrame {
  readonly tokensCss: string;
  readonly madeAt: string;
  readonly timeZone: string;
  readonly about: { readonly version: string; readonly commit: string; readonly analysisVersion: number };
  /** The page carries its packet. */
  readonly isPacket: boolean;
}

/** Where the packet goes in the page's text: right before its end. */
export const PAGE_END = '</body>\n</html>\n';

/** The report of some readings, as the text of a page up to `PAGE_END`. */
export function reportPage(content: ReportContent, frame: ReportFrame): string {
  const cautions = [...new Set(content.readings.flatMap(({ judgement }) => judgement.cautions))];
  const sites = [
    ...new Set(content.readings.map(({ names }) => names.site).filter((site) => site !== undefined)),
  ];
  const title = words.title(sites.length === 1 ? sites[0] : undefined);
  const body = html`${front(content, frame, title)}
  ${content.readings.map((reading) => readingSheet(reading, content.units))}`;
  return page(
    title,
    body,
    cautions.map((code) => cautionText(code).text),
    frame,
  );
}

/** The page of a large packet: a list of what is in it. */
export function listPage(rows: readonly TableReading[], frame: ReportFrame): string {
  const title = words.kindOfPaper;
  const lines = rows.map((row) => [
    whenText(row.reading.recordedAt, row.reading.timeZone),
    [row.label, row.spot, row.asset, row.site].filter((name) => name !== undefined).join(' · ') ||
      words.noSpot,
    `${row.reading.practice ? `${words.practiceShort} ` : ''}${headlineSentence(row.analysis)}`,
    sentenceCase(trustWord(row.analysis.trust)),
  ]);
  const body = html`<section class="front">
    ${head(rows.length, frame, title)}
    <p>${words.listOnly(rows.length)}</p>
    ${table(words.listHead, lines)}
  </section>`;
  return page(title, body, [cautionText('local-rules-first').text], frame);
}

function page(title: string, body: Html, cautions: readonly string[], frame: ReportFrame): string {
  const style = `${frame.tokensCss}${REPORT_CSS}`.replaceAll('<', '');
  return html`<!doctype html>
    <html lang="en" data-theme="light">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta
          http-equiv="Content-Security-Policy"
          content="default-src 'none'; img-src data:; style-src 'unsafe-inline'"
        />
        <title>${title}: ${words.kindOfPaper}, ${frame.madeAt.slice(0, 10)}</title>
        <style>
          ${{ html: style }}
        </style>
      </head>
      <body>
        <table class="sheet" role="presentation">
          <tfoot>
            <tr>
              <td>${foot(cautions)}</td>
            </tr>
          </tfoot>
          <tbody>
            <tr>
              <td>${body}</td>
            </tr>
          </tbody>
        </table>
      </body>
    </html> `.html;
}

const foot = (cautions: readonly string[]): Html =>
  html`<div class="foot"><b>${INDICATIVE_LINE}</b> ${cautions.join(' ')}</div>`;

const head = (readingCount: number, frame: ReportFrame, title: string): Html =>
  html`<header>
    <p class="line"><span>${words.kindOfPaper}</span><span>${words.count(readingCount)}</span></p>
    <h1>${title}</h1>
    <p class="quiet">
      ${words.made(whenText(frame.madeAt, frame.timeZone))}.
      ${words.madeWith(frame.about.version, frame.about.commit, frame.about.analysisVersion)}.
    </p>
    <p><b>${INDICATIVE_LINE}</b></p>
  </header>`;

function front({ readings, units }: ReportContent, frame: ReportFrame, title: string): Html {
  const grave = readings.filter(({ judgement }) => judgement.specialist.length > 0);
  return html`<section class="front">
    ${head(readings.length, frame, title)}
    ${
      grave.length > 0
        ? html`<aside class="specialist">
            <h3>${SPECIALIST_HEADING}</h3>
            <p>${grave.map(placeTitle).join('; ')}</p>
          </aside>`
        : undefined
    }
    <h3>${words.inShort}</h3>
    <ul class="short">
      ${readings.map((reading) => shortRow(reading, units))}
    </ul>
    ${readings.length <= FRONT_ROWS ? howTo(frame) : undefined}
  </section>`;
}

/** With more rows than this the front page is full, and how to read it stands at the end. */
const FRONT_ROWS = 6;

const howTo = (frame: ReportFrame): Html =>
  html`<section class="howto">
    <h3>${words.howToRead}</h3>
    <div>
      ${[PLUS_MINUS_NOTE, ...words.howTo, ...(frame.isPacket ? [words.opens] : [])].map(
        (text) => html`<p>${text}</p>`,
      )}
    </div>
  </section>`;

function shortRow(of: ReportReading, units: ReportUnits): Html {
  const { analysis, judgement, names, reading } = of;
  const pair = headlinePair(judgement.separations);
  const said = verdictSentence(analysis, judgement, { frequencyUnit: units.frequency });
  return html`<li>
    <div>
      ${placeTitle(of)}<small
        >${[names.site, names.asset].filter((name) => name !== undefined).join(' · ')}</small
      >
    </div>
    <div>
      ${pair ? html`<span class="${pair.verdict}">${verdictMark(pair.verdict)}</span>` : undefined}
      ${together(said.replace(/ Trust: \w+\.$/, ''))}
      ${reading.practice ? html`<b>${words.practiceShort}</b>` : undefined}
    </div>
    <div class="trust">${words.trust[judgement.trust]}</div>
  </li>`;
}
