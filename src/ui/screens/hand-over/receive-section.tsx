import { useEffect, useRef } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Incoming } from '../../../app/hand-over.ts';
import { handOverText as text, refusalReason } from '../../../text/hand-over.ts';
import { problemSentence } from '../../../text/problems.ts';
import { Button, LinkButton } from '../../components/button.tsx';
import { FileButton } from '../../components/file-button.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import { useLive } from '../../use-live.ts';
import styles from './hand-over.module.css';
import { PreviewCard } from './preview-card.tsx';

/** Endings first: systems know `.thrumbook.zip` as a ZIP, and a report as a page. */
const ACCEPT =
  '.zip,.html,.htm,.csv,.tsv,.txt,application/zip,text/html,text/csv,text/tab-separated-values,text/plain';

/** Files in: look first, then take. */
export function ReceiveSection({ app }: { readonly app: App }) {
  const incoming = useLive(app.handOver.incoming);
  const section = useRef<HTMLElement>(null);
  const { phase } = incoming;
  // A file dropped anywhere, or opened by the system: what becomes of it must be in sight.
  useEffect(() => {
    if (phase !== 'idle') section.current?.scrollIntoView({ block: 'start' });
  }, [phase]);
  return (
    <section class="stack" ref={section}>
      <h2>{text.receive}</h2>
      {incoming.phase === 'idle' ? (
        <>
          <p class="quiet">{text.receiveLead}</p>
          <div class="row">
            <FileButton label={text.open} accept={ACCEPT} onFile={(file) => void app.take.openFile(file)} />
          </div>
        </>
      ) : (
        <div class={styles.card}>
          <IncomingCard app={app} incoming={incoming} />
        </div>
      )}
    </section>
  );
}

function IncomingCard(props: { readonly app: App; readonly incoming: Exclude<Incoming, { phase: 'idle' }> }) {
  const { app, incoming } = props;
  const close = () => app.handOver.clearIncoming();
  switch (incoming.phase) {
    case 'looking':
    case 'taking': {
      const label = incoming.phase === 'looking' ? text.looking(incoming.name) : text.taking;
      return (
        <>
          <p role="status">{label}</p>
          <ProgressLine label={label} share={incoming.share} />
          {incoming.phase === 'taking' && <p class="note">{text.stopped}</p>}
          <div class="row">
            <Button onClick={close}>{text.cancel}</Button>
          </div>
        </>
      );
    }
    case 'seen':
      return <PreviewCard app={app} name={incoming.name} preview={incoming.preview} />;
    case 'taken':
      return (
        <>
          <p role="status">
            <b>{text.taken(incoming.readingCount)}</b>{' '}
            {incoming.refusedCount > 0 && text.leftOut(incoming.refusedCount)}
          </p>
          <div class="row">
            <LinkButton kind="main" href={app.navigation.href({ screen: 'readings' })}>
              {text.toReadings}
            </LinkButton>
            <Button kind="quiet" onClick={close}>
              {text.close}
            </Button>
          </div>
        </>
      );
    case 'refused':
    case 'failed': {
      const why =
        incoming.phase === 'refused'
          ? (refusalReason(incoming.problem.facts) ?? problemSentence(incoming.problem))
          : incoming.code === 'quota'
            ? text.failedTaking.quota
            : text.failedTaking.other;
      return (
        <>
          <p role="alert">
            <b class={styles.fileName}>{incoming.name}</b> {why}
          </p>
          <div class="row">
            <Button onClick={close}>{text.close}</Button>
          </div>
        </>
      );
    }
  }
}
