/** Files that the system opens with the installed app (manifest: file_handlers; Chromium on desktop). */
interface LaunchQueue {
  setConsumer(consumer: (launch: { readonly files: readonly FileSystemFileHandle[] }) => void): void;
}

export function takeLaunchedFiles(page: object, onFile: (file: File) => void): void {
  const queue = 'launchQueue' in page ? (page.launchQueue as LaunchQueue) : undefined;
  queue?.setConsumer(({ files }) => {
    for (const handle of files) void handle.getFile().then(onFile);
  });
}
