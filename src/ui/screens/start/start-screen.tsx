/** Start: take a reading, this round, what came last. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { RecoveredJournal } from '../../../app/ports.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button, LinkButton } from '../../components/button.tsx';
import { FileButton } from '../../components/file-button.tsx';
import { IconStart } from '../../components/icons.tsx';
import { Page } from '../../components/page.tsx';
import { RingDownFigure } from '../../components/ring-down-figure.tsx';
import { Rows } from '../../components/rows.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { usePlaceNames } from '../readings/place-names.ts';
import { ReadingRow } from '../readings/reading-row.tsx';
import styles from './start-screen.module.css';
import { UpdateNote } from './update-note.tsx';

const text = screenText.start;

/** As many as a glance takes in; the rest is one tap away. */
const RECENT_COUNT = 6;
/** A long round is seen whole; one that nobody ended for a year must not slow the start. */
const ROUND_COUNT = 60;

export function StartScreen({ app }: { readonly app: App }) {
  const names = usePlaceNames(app);
  const { round } = useLive(app.settings);
  const [dropped, setDropped] = useState(0);
  const loaded = useLoaded(
    app.store,
    async () => ({
      round: await app.rounds.current(new Date()),
      recent: (await app.readings.list()).slice(0, RECENT_COUNT),
      cut: await app.store.recoverable(),
    }),
    [round, dropped],
  );
  const isNew = loaded?.recent.length === 0;
  const inRound = loaded?.round.readings ?? [];
  const roundIds = new Set(inRound.map((reading) => reading.id));
  const earlier = (loaded?.recent ?? []).filter((reading) => !roundIds.has(reading.id));
  return (
    <Page
      {...(isNew ? { over: screenText.appName } : {})}
      title={isNew ? text.lead : screenText.appName}
      quietFocus
    >
      <UpdateNote app={app} />
      {loaded?.cut.map((journal) => (
        <CutRecording
          key={journal.journalId}
          app={app}
          journal={journal}
          onDropped={() => setDropped((count) => count + 1)}
        />
      ))}
      {isNew && <Welcome />}
      {inRound.length > 0 && (
        <section class="stack">
          <div class="row row-apart">
            <h2>
              {text.round} <span class="quiet">{text.roundNote(inRound.length)}</span>
            </h2>
            <Button kind="quiet" onClick={() => app.rounds.end()}>
              {text.endRound}
            </Button>
          </div>
          <Rows label={text.round}>
            {inRound.slice(0, ROUND_COUNT).map((reading) => (
              <ReadingRow key={reading.id} names={names} app={app} reading={reading} />
            ))}
          </Rows>
        </section>
      )}
      {earlier.length > 0 && (
        <section class="stack">
          <h2>{text.recent}</h2>
          <Rows label={text.recent}>
            {earlier.map((reading) => (
              <ReadingRow key={reading.id} names={names} app={app} reading={reading} />
            ))}
          </Rows>
        </section>
      )}
      <div class="row">
        {loaded && !isNew && (
          <LinkButton kind="quiet" href={app.navigation.href({ screen: 'readings' })}>
            {text.all}
          </LinkButton>
        )}
        <FileButton kind="quiet" label={text.openFile} onFile={(file) => void app.take.openFile(file)} />
        <PracticeSwitch app={app} />
        <LinkButton kind="quiet" href={app.navigation.href({ screen: 'pace' })}>
          {text.pace}
        </LinkButton>
      </div>
      <BottomBar>
        <TakeButton app={app} />
      </BottomBar>
    </Page>
  );
}

function TakeButton({ app }: { readonly app: App }) {
  return (
    <Button kind="main" onClick={() => app.navigation.go({ screen: 'take' })}>
      <IconStart />
      {text.take}
    </Button>
  );
}

/** Without a sensor, or before a real structure: the simulated phone, and the way out of it. */
function PracticeSwitch({ app }: { readonly app: App }) {
  const { practice } = useLive(app.take.plan);
  return (
    <Button kind="quiet" onClick={() => (practice ? app.take.leavePractice() : app.take.usePractice())}>
      {practice ? text.leavePractice : text.practice}
    </Button>
  );
}

function Welcome() {
  return (
    <section class="stack">
      <RingDownFigure />
      <ol class="stack stack-tight">
        {text.steps.map((step, index) => (
          <li key={step}>
            <strong>{index + 1}.</strong> {step}
          </li>
        ))}
      </ol>
      <p class="quiet">{text.emptyNote}</p>
    </section>
  );
}

function CutRecording(props: {
  readonly app: App;
  readonly journal: RecoveredJournal;
  readonly onDropped: () => void;
}) {
  const { app, journal } = props;
  const drop = () => void app.store.dropJournal(journal.journalId).then(props.onDropped);
  const recover = () => {
    app.navigation.go({ screen: 'take' });
    void app.take.recover(journal);
  };
  return (
    <section class={`stack stack-tight ${styles.cut}`} role="status">
      <h2>{text.recoverTitle}</h2>
      <p class="quiet">{text.recoverNote(Math.round(journal.durationS), dayAndTime(journal.startedAt))}</p>
      <div class="row">
        <Button onClick={recover}>{text.recover}</Button>
        <Button kind="quiet" onClick={drop}>
          {text.dropRecovered}
        </Button>
      </div>
    </section>
  );
}
