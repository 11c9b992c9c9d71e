/** The address of a saved file is kept so long, ms: some browsers read it only after the person has answered a dialog. */
const KEPT_MS = 120_000;

/**
 * A home-screen app on iOS opens a saved file over itself without a way back (WebKit 236943, 275288): there only the share
 * sheet is safe.
 */
export const savesSafely = (): boolean =>
  !('standalone' in navigator && (navigator as { standalone?: unknown }).standalone === true);

/** Hands the file to the browser's downloads. */
export function saveFile(file: File): void {
  const address = URL.createObjectURL(file);
  const link = document.createElement('a');
  link.href = address;
  link.download = file.name;
  document.body.append(link);
  link.click();
  link.remove();
  setTimeout(() => URL.revokeObjectURL(address), KEPT_MS);
}
