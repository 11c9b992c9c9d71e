import type { Verdict } from '../../core/model/judgement.ts';
import { VERDICT_BOX_PX, verdictShape } from '../../core/picture/verdict-shape.ts';
import { formatInterval } from '../../text/number.ts';
import { readingText } from '../../text/reading-screen.ts';
import { html, ownSvg, type Html } from './html.ts';

export const sentenceCase = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** A number as it is read, with the stored value beside it for whoever checks: SI, all digits. */
export const figure = (stored: number, said: string): Html => html`<data value="${stored}">${said}</data>`;

/** A short cell that is never broken. */
export const tight = (cell: string | Html): Html => html`<span class="tight">${cell}</span>`;

/** Sign of a verdict, told by shape and colour; its word must stand beside it. */
export function verdictMark(verdict: Verdict): Html {
  const { filled, outline } = verdictShape(verdict);
  const box = `0 0 ${VERDICT_BOX_PX} ${VERDICT_BOX_PX}`;
  return html`<svg class="mark ${verdict}" viewBox="${box}" aria-hidden="true">
    <path d="${filled}" fill="currentColor" />
    <path d="${outline}" fill="none" stroke="currentColor" stroke-width="1.6" />
  </svg>`;
}

/** Rows of name and value; what is not known has no row. */
export function factRows(rows: readonly (readonly [name: string, value: string | Html | undefined])[]): Html {
  const known = rows.filter(([, value]) => value !== undefined && value !== '');
  return html`<dl class="facts">
    ${known.map(
      ([name, value]) =>
        html`<div>
          <dt>${name}</dt>
          <dd>${value}</dd>
        </div>`,
    )}
  </dl>`;
}

export function table(head: readonly string[], rows: readonly (readonly (string | Html)[])[]): Html {
  return html`<table class="numbers">
    <thead>
      <tr>
        ${head.map((name) => html`<th scope="col">${name}</th>`)}
      </tr>
    </thead>
    <tbody>
      ${rows.map(
        ([first = '', ...rest]) =>
          html`<tr>
            <th scope="row">${first}</th>
            ${rest.map((cell) => html`<td>${cell}</td>`)}
          </tr>`,
      )}
    </tbody>
  </table>`;
}

export const chartFigure = (svg: string | undefined, title: string, note: string, name: string): Html =>
  svg === undefined
    ? html``
    : html`<figure class="chart ${name}">
        <h4>${title}</h4>
        ${ownSvg(svg)}
        <figcaption>${note}</figcaption>
      </figure>`;

export const titled = (title: string, body: Html | readonly Html[] | undefined): Html | undefined =>
  body === undefined
    ? undefined
    : html`<section class="part">
        <h4>${title}</h4>
        ${body}
      </section>`;

/** Off the scale of any phone reading. */
const LARGEST_SAID = 999;
export const times = ([low, high]: readonly [number, number]): string =>
  readingText.pair.times(formatInterval([low, Math.min(high, LARGEST_SAID)]));

/** A value, its unit and its ± stay on one line. */
export const together = (said: string): string =>
  said.replaceAll(/ (?=±|Hz|%|m\/s²|r\/min)|(?<=±) /g, '\u00a0');
