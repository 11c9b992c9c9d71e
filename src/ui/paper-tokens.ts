/** Tokens as they are on light paper, whatever theme the screen has, as a style sheet for pages of their own. */
export function paperTokens(names: readonly string[]): string {
  const paper = document.createElement('div');
  paper.dataset['theme'] = 'light';
  paper.hidden = true;
  document.body.append(paper);
  const style = getComputedStyle(paper);
  const values = names.map((name) => `${name}:${style.getPropertyValue(name)}`);
  paper.remove();
  return `:root{color-scheme:light;${values.join(';')}}`;
}
