/** A value, its unit and its ± stay on one line. */
export const keptTogether = (text: string): string =>
  text.replaceAll(/ ?± ?/g, '\u00a0±\u00a0').replaceAll(/(\d) (?=Hz|%|r\/min|m\/s|mm\/s|m?g\b)/g, '$1\u00a0');
