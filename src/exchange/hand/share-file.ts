/** Whether this browser's share sheet takes the file: its type decides (Chromium takes html, csv, png, svg; not zip, not json). */
export function canShareFile(file: File): boolean {
  try {
    return navigator.canShare?.({ files: [file] }) ?? false;
  } catch {
    return false;
  }
}

/** Call it right in the tap that asked for it, with the file made before: browsers allow it only then. */
export async function shareFile(file: File): Promise<'shared' | 'cancelled' | 'refused'> {
  try {
    await navigator.share({ files: [file] });
    return 'shared';
  } catch (error) {
    return error instanceof Error && error.name === 'AbortError' ? 'cancelled' : 'refused';
  }
}
