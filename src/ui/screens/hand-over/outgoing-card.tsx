import type { App } from '../../../app/app.ts';
import type { Form, Outgoing } from '../../../app/hand-over.ts';
import { handOverText as text } from '../../../text/hand-over.ts';
import { formatNumber } from '../../../text/number.ts';
import { Button } from '../../components/button.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import styles from './hand-over.module.css';

const BYTES_PER_MEGABYTE = 1_000_000;

/** The file that is being made or is ready, with the ways it can go from here. */
export function OutgoingCard(props: {
  readonly app: App;
  readonly outgoing: Exclude<Outgoing, { phase: 'idle' }>;
}) {
  const { app, outgoing } = props;
  const { handOver } = app;
  const close = () => handOver.clearOutgoing();
  if (outgoing.phase === 'making')
    return (
      <div class={styles.card}>
        <p role="status">
          <b>{titleOf(outgoing.form)}.</b> {text.making}
        </p>
        <ProgressLine label={text.making} share={outgoing.share} />
        <div class="row">
          <Button onClick={close}>{text.cancel}</Button>
        </div>
      </div>
    );
  if (outgoing.phase === 'failed')
    return (
      <div class={styles.card}>
        <p role="alert">{text.failures[outgoing.why]}</p>
        <div class="row">
          <Button onClick={close}>{text.putAway}</Button>
        </div>
      </div>
    );
  return (
    <div class={styles.card}>
      <ReadyFile outgoing={outgoing} />
      <div class="row">
        {outgoing.ways.map((way, index) => (
          <Button key={way} kind={index === 0 ? 'main' : 'plain'} onClick={() => void handOver[way]()}>
            {text[way]}
          </Button>
        ))}
        <Button kind="quiet" onClick={close}>
          {text.putAway}
        </Button>
      </div>
    </div>
  );
}

function ReadyFile({ outgoing }: { readonly outgoing: Extract<Outgoing, { phase: 'ready' }> }) {
  const { file, ways, outcome, form } = outgoing;
  const megabytes = formatNumber(Math.max(0.01, file.size / BYTES_PER_MEGABYTE), 2);
  const said =
    outcome === undefined
      ? undefined
      : { shared: text.shared, saved: text.saved, refused: text.notShared }[outcome];
  return (
    <>
      <p role="status">
        <b>
          {titleOf(form)}. {text.ready}.
        </b>{' '}
        {said}
      </p>
      <p class={styles.fileName}>
        {file.name} <span class="quiet">{text.size(megabytes)}</span>
      </p>
      {!ways.includes('share') && (
        <p class="note">{form.kind === 'packet' ? text.cannotShare.packet : text.cannotShare.other}</p>
      )}
      {!ways.includes('save') && <p class="note">{text.onlyShare}</p>}
    </>
  );
}

function titleOf(form: Form): string {
  if (form.kind === 'samples') return text.singleForms[form.as === 'csv' ? 'samplesCsv' : 'samplesNpy'].title;
  return form.kind === 'chart' ? text.singleForms[form.chart].title : text.forms[form.kind].title;
}
