import { useEffect, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { TeamStore } from '../../../app/team-store.ts';
import { teamStoreText as text } from '../../../text/team-store.ts';
import { Button } from '../../components/button.tsx';
import { useLive } from '../../use-live.ts';
import { ConflictSection } from './conflict-section.tsx';
import { TeamAccountForm } from './team-account-form.tsx';
import { TeamStandingCard } from './team-standing-card.tsx';
import styles from './team-store.module.css';

/** The team's own database server, for teams that outgrow one laptop; and what two people wrote at once. */
export function TeamStoreSection({ app }: { readonly app: App }) {
  const [team, setTeam] = useState<TeamStore>();
  useEffect(() => {
    let isCurrent = true;
    const open = async () => {
      const opened = await app.teamStore();
      await opened.look();
      if (isCurrent) setTeam(() => opened);
    };
    open().catch((error: unknown) => app.noteError(error));
    return () => {
      isCurrent = false;
    };
  }, [app]);
  return (
    <>
      <ConflictSection app={app} />
      {team && <Team app={app} team={team} />}
    </>
  );
}

function Team({ app, team }: { readonly app: App; readonly team: TeamStore }) {
  const { account } = useLive(team.state);
  const [isEditing, setEditing] = useState(false);
  const url = typeof account === 'object' ? account.url : undefined;
  const isForm = isEditing || (typeof account === 'object' && !account.isPasswordKnown);
  return (
    <section class="stack" aria-labelledby="team-store-title">
      <h2 id="team-store-title">{text.title}</h2>
      {isForm ? (
        <TeamAccountForm
          app={app}
          team={team}
          {...(typeof account === 'object' ? { known: account } : {})}
          onDone={() => setEditing(false)}
        />
      ) : url === undefined ? (
        <>
          <p class="quiet">
            {text.lead} {text.notSetUp}
          </p>
          <div class="row">
            <Button onClick={() => setEditing(true)}>{text.setUp}</Button>
          </div>
        </>
      ) : (
        <TeamStandingCard app={app} team={team} onChangeAccount={() => setEditing(true)} />
      )}
      <p>
        <a class={styles.link} href="./help/team-store.html" target="_blank" rel="noopener">
          {text.administrator}
        </a>
      </p>
    </section>
  );
}
