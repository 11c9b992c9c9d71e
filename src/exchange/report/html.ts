/** A piece of a page. Only `html` makes one, so everything else that is put into a page is escaped. */
export interface Html {
  readonly html: string;
}

type Part = string | number | Html | undefined | false | readonly Part[];

const ESCAPES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

const escaped = (text: string): string => text.replaceAll(/[&<>"']/g, (letter) => ESCAPES[letter]!);

function partText(part: Part): string {
  if (part === undefined || part === false) return '';
  if (typeof part === 'string') return escaped(part);
  if (typeof part === 'number') return String(part);
  if ('html' in part) return part.html;
  return part.map(partText).join('');
}

/** A template of HTML: text and attributes put into it are escaped, pieces made by itself are not. */
export function html(fixed: TemplateStringsArray, ...parts: readonly Part[]): Html {
  return { html: fixed.map((text, i) => text + partText(parts[i])).join('') };
}

/** Our own drawings, whose texts are escaped where they are made (core/picture). */
export const ownSvg = (svg: string): Html => ({ html: svg });
