import type { App } from '../../../app/app.ts';
import type { TeamStore, TeamStoreState } from '../../../app/team-store.ts';
import { teamStoreText as text } from '../../../text/team-store.ts';
import { Button } from '../../components/button.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLive } from '../../use-live.ts';
import styles from './team-store.module.css';

/** Whose server, how it stands, the one button; and what came of it. */
export function TeamStandingCard(props: {
  readonly app: App;
  readonly team: TeamStore;
  readonly onChangeAccount: () => void;
}) {
  const { app, team } = props;
  const state = useLive(team.state);
  const { account, standing, progress } = state;
  if (typeof account !== 'object') return null;
  const replicate = (again = false) =>
    void team.replicate({ again }).catch((error: unknown) => app.noteError(error));
  return (
    <div class={styles.card}>
      <p class={styles.where}>
        <b>{account.url.replace(/^https:\/\//, '')}</b> <span class="quiet">{text.asUser(account.user)}</span>
      </p>
      {standing && (
        <dl class={styles.facts}>
          <div>
            <dt>{text.lastSuccess}</dt>
            <dd>{standing.lastSuccessAt ? dayAndTime(standing.lastSuccessAt) : text.never}</dd>
          </div>
          <div>
            <dt>{text.waiting}</dt>
            <dd>
              {standing.waitingCount === 0 ? text.nothingWaiting : text.waitingCount(standing.waitingCount)}
            </dd>
          </div>
        </dl>
      )}
      {progress ? (
        <>
          <p class={styles.figures}>{text.progress(progress)}</p>
          <ProgressLine
            label={text.runningTitle}
            {...(progress.totalCount > 0 ? { share: progress.doneCount / progress.totalCount } : {})}
          />
          <div class="row">
            <Button onClick={team.cancel}>{text.stop}</Button>
          </div>
        </>
      ) : (
        <div class="row">
          <Button kind="main" onClick={() => replicate()}>
            {text.run}
          </Button>
        </div>
      )}
      <Outcome state={state} />
      {!progress && (
        <details>
          <summary>{text.more}</summary>
          <div class="stack">
            <p class="note">{text.againNote}</p>
            <div class="row">
              <Button onClick={() => replicate(true)}>{text.again}</Button>
            </div>
            <p class="note">{text.forgetNote}</p>
            <div class="row">
              <Button onClick={props.onChangeAccount}>{text.change}</Button>
              <Button kind="grave" onClick={() => void team.forget()}>
                {text.forget}
              </Button>
            </div>
            <p class="note">{text.eraseNote}</p>
          </div>
        </details>
      )}
    </div>
  );
}

/** Most rows of refused entries that are listed at once. */
const SHOWN_COUNT = 20;

function Outcome({ state: { report, standing, progress } }: { readonly state: TeamStoreState }) {
  const isFailed = report !== undefined && report.end !== 'done' && report.end !== 'cancelled';
  const refused = standing?.refused ?? [];
  return (
    <>
      <p role="status" class={isFailed ? styles.problem : styles.outcome}>
        {report && !progress ? text.report(report) : ''}
      </p>
      {isFailed && !progress && <p class="note">{text.nothingLost}</p>}
      {refused.length > 0 && !progress && (
        <details>
          <summary>{text.refused(refused.length)}</summary>
          <ul class={styles.refused}>
            {refused.slice(0, SHOWN_COUNT).map(({ id, lies, reason }) => (
              <li key={`${lies} ${id}`}>
                <code>{id}</code>
                <span class="note">{text.refusedRow(lies, reason)}</span>
              </li>
            ))}
          </ul>
        </details>
      )}
    </>
  );
}
