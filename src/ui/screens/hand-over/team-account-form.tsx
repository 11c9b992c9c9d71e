import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { TeamStore } from '../../../app/team-store.ts';
import type { TeamStoreProblem } from '../../../core/model/team-store.ts';
import { teamStoreProblems, teamStoreText as text } from '../../../text/team-store.ts';
import { Button } from '../../components/button.tsx';
import { CheckField, TextField } from '../../components/field.tsx';
import styles from './team-store.module.css';

/** Problems that the address is to blame for, said beside it. */
const OF_ADDRESS: readonly TeamStoreProblem[] = ['bad-address', 'not-secure', 'no-database'];

/** Address, name, password. The server is asked before anything is remembered. */
export function TeamAccountForm(props: {
  readonly app: App;
  readonly team: TeamStore;
  readonly known?: { readonly url: string; readonly user: string; readonly isPasswordKnown: boolean };
  readonly onDone: () => void;
}) {
  const { app, team, known, onDone } = props;
  const [url, setUrl] = useState(known?.url ?? '');
  const [user, setUser] = useState(known?.user ?? '');
  const [password, setPassword] = useState('');
  const [isKept, setKept] = useState(false);
  const [problem, setProblem] = useState<TeamStoreProblem>();
  const [isAsking, setAsking] = useState(false);
  const isSigningIn = known !== undefined && !known.isPasswordKnown;

  const connect = async () => {
    setAsking(true);
    setProblem(undefined);
    try {
      const found = await team.connect({ url, user: user.trim(), password }, isKept);
      setProblem(found);
      if (found === undefined) onDone();
    } catch (error) {
      app.noteError(error);
    } finally {
      setAsking(false);
    }
  };
  const isOfAddress = problem !== undefined && OF_ADDRESS.includes(problem);
  return (
    <form
      class={styles.card}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        if (!isAsking) void connect();
      }}
    >
      {isSigningIn && <p>{text.needsPassword}</p>}
      <TextField
        label={text.address}
        type="url"
        value={url}
        note={text.addressNote}
        problem={isOfAddress ? teamStoreProblems[problem] : undefined}
        onInput={setUrl}
      />
      <TextField label={text.user} value={user} onInput={setUser} />
      <TextField label={text.password} type="password" value={password} onInput={setPassword} />
      <CheckField label={text.keepPassword} checked={isKept} onChange={setKept} />
      <p class="note">{text.keepNote}</p>
      <p role="status" class={styles.problem}>
        {isAsking ? text.connecting : problem && !isOfAddress ? teamStoreProblems[problem] : ''}
      </p>
      <div class="row">
        <Button kind="main" type="submit" onClick={() => {}} disabled={isAsking || url === '' || user === ''}>
          {isSigningIn ? text.signIn : text.connect}
        </Button>
        {isSigningIn ? (
          <Button kind="grave" onClick={() => void team.forget().then(onDone)}>
            {text.forget}
          </Button>
        ) : (
          <Button onClick={onDone}>{text.cancel}</Button>
        )}
      </div>
    </form>
  );
}
