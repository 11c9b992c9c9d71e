/**
 * Prints a report without leaving the app. The page's own policy allows no style inside documents, so the report's styles are
 * taken out of it and given to the frame as a sheet object.
 */
export async function printPage(file: File): Promise<void> {
  const text = await file.text();
  const [styled, css = ''] = /<style>([^<]*)<\/style>/.exec(text) ?? [];
  // The packet inside is not printed, and the policy of the page that shows it stands already.
  const plain = text.replace(styled ?? '', '').replace(/<template[\s\S]*/, '');
  const page = new DOMParser().parseFromString(plain, 'text/html');
  page.querySelectorAll('meta[http-equiv]').forEach((element) => element.remove());
  document.querySelector('iframe[data-print]')?.remove();
  const frame = document.createElement('iframe');
  frame.dataset['print'] = '';
  frame.setAttribute('aria-hidden', 'true');
  frame.tabIndex = -1;
  frame.className = 'unseen';
  document.body.append(frame);
  const { contentWindow: inner, contentDocument: paper } = frame;
  if (inner === null || paper === null) throw new Error('no frame to print from');
  paper.documentElement.replaceWith(paper.adoptNode(page.documentElement));
  const sheet = new (inner as Window & typeof globalThis).CSSStyleSheet();
  sheet.replaceSync(css);
  paper.adoptedStyleSheets = [sheet];
  await Promise.all([...paper.images].map((image) => image.decode().catch(() => undefined)));
  inner.focus();
  inner.print();
}
