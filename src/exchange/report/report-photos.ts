import type { ReportReading } from '../../app/ports.ts';
import { base64Lines } from '../../core/packet/packet-base64.ts';
import { reportText as words } from '../../text/report.ts';
import { html, type Html } from './html.ts';

/** Photos of a reading that are printed; the packet has them all. */
const MOST_PHOTOS = 4;

const source = (jpeg: Uint8Array): string =>
  `data:image/jpeg;base64,${new TextDecoder().decode(base64Lines(jpeg)).replaceAll('\n', '')}`;

export function photoFigures({ photos, names, label }: ReportReading): Html | undefined {
  if (photos.length === 0) return undefined;
  const where = names.spot ?? label ?? words.noSpot;
  return html`<div class="photos">
    ${photos
      .slice(0, MOST_PHOTOS)
      .map((jpeg, i) => html`<img src="${source(jpeg)}" alt="${words.photo(i + 1, where)}" />`)}
  </div>`;
}
