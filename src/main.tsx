/** Composition root: the only place that knows every edge. */
// First, so that the order of the layers is stated before any component's styles.
import './ui/styles/index.css';
import { render } from 'preact';
import { createApp } from './app/app.ts';
import { takeLaunchedFiles } from './app/launched-files.ts';
import { createNavigation } from './app/navigation.ts';
import { createOfflineUpdates } from './app/offline-updates.ts';
import { createCapture } from './capture/create-capture.ts';
import { RECORDER_LOCK } from './capture/recorder-lock.ts';
import { ANALYSIS_VERSION } from './core/model/analysis.ts';
import { openStore } from './store/open-store.ts';
import { problemSentence } from './text/problems.ts';
import { screenText } from './text/screens.ts';
import { paperTokens } from './ui/paper-tokens.ts';
import { Root } from './ui/root.tsx';
import { StartFailed } from './ui/start-failed.tsx';
import { applyRememberedTheme } from './ui/theme.ts';
import { createAnalysisClient } from './worker/client.ts';

applyRememberedTheme();
const root = document.getElementById('app');
if (root) assemble(root).catch((error: unknown) => render(<StartFailed error={error} />, root));

async function assemble(place: HTMLElement): Promise<void> {
  const store = await openStore({
    onBlocked: () => render(<StartFailed error={{ code: 'blocked' }} />, place),
  });
  const isOff = (await store.getSetting('offline')) === 'off';
  const navigation = createNavigation(window);
  const practice = new URLSearchParams(location.search).has('rig') ? location.search : undefined;
  const update = createOfflineUpdates({
    container: navigator.serviceWorker,
    locks: navigator.locks,
    recorderLock: RECORDER_LOCK,
    reload: () => location.reload(),
    isOff,
    onError: (error) => store.noteError(errorText(error)),
  });
  const about = { version: __APP_VERSION__, commit: __APP_COMMIT__, analysisVersion: ANALYSIS_VERSION };
  const analysis = createAnalysisClient();
  const app = await createApp({
    about,
    navigation,
    capture: createCapture({ journal: store, checkPhone: analysis.checkPhone }),
    analysis,
    store,
    update,
    readRecording: async (file) => {
      const { readRecordingFile } = await import('./app/read-recording-file.ts');
      return readRecordingFile(file);
    },
    teamStore: async () => {
      const { createTeamStore } = await import('./exchange/team-store/create-team-store.ts');
      return createTeamStore(store);
    },
    exchange: async () => {
      const { createExchange } = await import('./exchange/create-exchange.ts');
      return createExchange({ store, about, now: () => new Date(), tokensCss: paperTokens });
    },
    problemSentence,
    environment: {
      now: () => new Date(),
      timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone,
      userAgent: navigator.userAgent,
      ...(practice ? { practice } : {}),
    },
  });
  addEventListener('error', (event) => app.noteError(event.error ?? event.message));
  addEventListener('unhandledrejection', (event) => app.noteError(event.reason));
  store.onChange((what) => {
    if (what === 'closed') app.notices.show(screenText.storeClosed, { tone: 'failure' });
  });
  openLaunchedFiles((file) => void app.take.openFile(file));
  render(<Root app={app} />, place);
  takeLaunchedFiles(window, (file) => void app.take.openFile(file));
}

/** Files that the system opened the installed app with (the manifest's file_handlers). */
function openLaunchedFiles(open: (file: File) => void): void {
  const queue = (globalThis as { launchQueue?: LaunchQueue }).launchQueue;
  queue?.setConsumer(({ files }) => void files[0]?.getFile().then(open));
}
interface LaunchQueue {
  setConsumer(
    consumer: (launched: { readonly files: readonly { getFile(): Promise<File> }[] }) => void,
  ): void;
}

const errorText = (error: unknown) => (error instanceof Error ? error.message : String(error));
