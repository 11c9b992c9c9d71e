import type { ReportReading } from '../../app/ports.ts';
import { base64Lines } from '../../core/packet/packet-base64.ts';
import { reportText as words } from '../../text/report.ts';
import { html, type Html } from './html.ts';

/** Photos of a reading that are printed; the packet has them all. */
const MOST_PHOTOS = 4;

const source = (jpeg: Uint8Array): string =>
  `data:image/jpeg;base64,${new TextDecoder().decode(base64Lines(jpeg)).replaceAll('\n', '')}`;

/** Photos from `from` on, side by side; the first of a reading stands beside its ladder. */
export function photoFigures(
  { photos, names, label }: ReportReading,
  from: number,
  to: number,
): Html | undefined {
  const where = names.spot ?? label ?? words.noSpot;
  const shown = photos.slice(from, Math.min(to, MOST_PHOTOS));
  if (shown.length === 0) return undefined;
  return html`<div class="photos">
    ${shown.map((jpeg, i) => html`<img src="${source(jpeg)}" alt="${words.photo(from + i + 1, where)}" />`)}
  </div>`;
}
