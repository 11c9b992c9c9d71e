/** Every sentence of the team store and of what two people wrote at once. */
import type { EntityKind } from '../core/model/fact.ts';
import type {
  FactRefusal,
  TeamStoreProblem,
  TeamStoreProgress,
  TeamStoreReport,
} from '../core/model/team-store.ts';

/** A count with its thousands apart. */
const counted = (count: number) => String(count).replace(/\B(?=(?:\d{3})+$)/g, ',');
const things = (count: number) => (count === 1 ? '1 entry' : `${counted(count)} entries`);

/** What happened, and what to do about it. */
export const teamStoreProblems: Readonly<Record<TeamStoreProblem, string>> = {
  'bad-address':
    'This is not the address of a team store. It looks like https://store.example/works-team: the server, then the name of the database in small letters.',
  'not-secure': 'The address begins with http. Only https is used, because name and password travel with it.',
  unreachable:
    'The server does not answer this page. Either there is no network here, or the address is wrong, its certificate is not trusted, or the administrator has not yet allowed this page (CORS).',
  'blocked-by-policy':
    'This copy of the program may only talk to the team stores it was built for. Ask whoever set it up.',
  'not-signed-in': 'The server does not know this name with this password.',
  'not-permitted': 'The server knows you but does not let you into this database. Ask its administrator.',
  'no-database': 'The server has no database of this name.',
  'not-a-team-store':
    'A web page answered instead of a team store. In a guest network, sign in to it first; otherwise look at the address.',
  redirected:
    'The server sends this page elsewhere. Name and password do not follow: enter the address where the team store really is.',
  'strange-answer':
    'The server answered something that a team store does not say. Nothing was taken from it.',
  'too-much': 'The server sent more than a team store would. Nothing of that was taken.',
  stalled: 'The server stopped answering in the middle.',
  'server-failing': 'The server says that it has a problem of its own.',
  'not-kept':
    'The server said it had taken the readings, but does not have them. They still wait on this phone.',
};

const refusals: Readonly<Record<FactRefusal, string>> = {
  damaged: 'damaged: its content is not what its own mark says',
  'other-content': 'on the server with another content; yours is kept here',
  'raw-missing': 'without its samples',
  'raw-damaged': 'its samples are not those that were measured',
  'too-large': 'larger than the server or this program takes',
  'not-permitted': 'the server does not let you write it',
};

const steps: Readonly<Record<TeamStoreProgress['step'], string>> = {
  sending: 'Sending',
  fetching: 'Fetching',
  pausing: 'The link was cut. Trying again in a moment',
};

const english = {
  title: 'Team store',
  lead: 'A database server of your own team. Each phone and laptop sends what it has and fetches what the others sent; nothing arrives twice, and it may be cut at any time.',
  notSetUp: 'None is set up: nothing is sent anywhere.',
  setUp: 'Set up a team store',
  address: 'Address',
  addressNote: 'From your administrator, e.g. https://store.example/works-team',
  user: 'Your name there',
  password: 'Password',
  keepPassword: 'Keep the password on this phone',
  keepNote:
    'It then lies here unencrypted: whoever can unlock this phone can read it. Otherwise you enter it once each time the program is opened.',
  connect: 'Connect',
  connecting: 'Asking the server…',
  cancel: 'Cancel',
  run: 'Send and fetch',
  runningTitle: 'Send and fetch',
  stop: 'Stop',
  needsPassword: 'Enter the password to go on.',
  signIn: 'Sign in',
  lastSuccess: 'Last complete',
  never: 'not yet',
  waiting: 'Waiting here',
  nothingWaiting: 'nothing',
  waitingCount: things,
  asUser: (user: string) => `as ${user}`,
  progress({ step, doneCount, totalCount }: TeamStoreProgress): string {
    if (step === 'pausing') return `${steps.pausing}…`;
    if (totalCount === 0) return 'Comparing…';
    return `${steps[step]}: ${counted(doneCount)} of ${counted(totalCount)}`;
  },
  report: ({ sentCount, fetchedCount, end }: TeamStoreReport) => {
    const moved =
      sentCount + fetchedCount === 0 ? '' : `${counted(sentCount)} sent, ${counted(fetchedCount)} fetched.`;
    if (end === 'done') return moved === '' ? 'Both sides have the same.' : `Complete: ${moved}`;
    if (end === 'cancelled') return `Stopped. ${moved} What is left goes next time.`.replace('  ', ' ');
    return `${teamStoreProblems[end]} ${moved}`.trim();
  },
  nothingLost: 'Nothing is lost: what has not arrived still waits here.',
  refused: (count: number) => `${things(count)} left where they are`,
  refusedRow: (lies: 'here' | 'there', reason: FactRefusal) =>
    `${lies === 'here' ? 'On this phone' : 'On the server'}: ${refusals[reason]}`,
  more: 'Account and checks',
  again: 'Compare everything again',
  againNote: 'Looks at every entry on both sides, also at those that were left. Takes longer.',
  change: 'Change account',
  forget: 'Forget this team store',
  forgetNote: 'Address and password leave this phone. Readings stay here and there.',
  administrator: 'How to set up the server (for its administrator)',
  eraseNote:
    'Erasing a reading here is told to the others, but a server keeps its copy until its administrator purges it.',
  conflicts: (count: number) =>
    count === 1 ? 'One entry was written twice' : `${count} entries were written twice`,
  conflictsLead:
    'Two people wrote them, neither knowing of the other. Choose what counts; the other stays in the history.',
  conflictOf: (kind: EntityKind, name: string | undefined, field: string) =>
    `${fieldWords[field] ?? field} of ${name === undefined ? kindWords[kind].none : `${kindWords[kind].the} “${name}”`}`,
  writtenHere: 'on this device',
  writtenBy: (device: string) => `on another device (${device.slice(-4)})`,
  valueWithUnit: (field: string, value: string) => {
    const unit = fieldUnits[field];
    return unit === undefined ? value : `${value} ${unit}`;
  },
  keepThis: 'Keep this',
  keepLabel: (value: string) => `Keep ${value}`,
  empty: 'empty',
  yes: 'yes',
  no: 'no',
} as const;

const kindWords: Readonly<Record<EntityKind, { readonly the: string; readonly none: string }>> = {
  site: { the: 'site', none: 'a site' },
  asset: { the: 'asset', none: 'an asset' },
  spot: { the: 'spot', none: 'a spot' },
  source: { the: 'source', none: 'a source' },
  round: { the: 'round', none: 'a round' },
  reading: { the: 'reading', none: 'a reading' },
  photo: { the: 'photo', none: 'a photo' },
};

const fieldWords: Readonly<Record<string, string>> = {
  label: 'Name',
  name: 'Name',
  notes: 'Notes',
  trashed: 'In the trash',
  site: 'Site',
  asset: 'Asset',
  spot: 'Spot',
  round: 'Round',
  kind: 'Kind',
  direction: 'Direction',
  hint: 'Where to lay the phone',
  speedRpm: 'Speed',
  toleranceRatio: 'Tolerance of the speed',
  frequencyHz: 'Frequency',
  bladeCount: 'Number of blades',
};

const fieldUnits: Readonly<Record<string, string>> = {
  speedRpm: 'r/min',
  frequencyHz: 'Hz',
};

export type TeamStoreText = typeof english;
export const teamStoreText: TeamStoreText = english;
