/** A value and its ± stay on one line. */
export const keptTogether = (text: string): string =>
  text.replaceAll(' ±', '\u00a0±').replaceAll('± ', '±\u00a0');
