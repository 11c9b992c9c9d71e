/** Closed list of reasons why work with a team store ended. Sentences: src/text/team-store.ts. */
export const TEAM_STORE_PROBLEMS = [
  'bad-address',
  'not-secure',
  'unreachable',
  'blocked-by-policy',
  'not-signed-in',
  'not-permitted',
  'no-database',
  'not-a-team-store',
  'redirected',
  'strange-answer',
  'too-much',
  'stalled',
  'server-failing',
  'not-kept',
] as const;
export type TeamStoreProblem = (typeof TEAM_STORE_PROBLEMS)[number];

/** Why a single fact stayed where it was while all others went on. */
export const FACT_REFUSALS = [
  'damaged',
  'other-content',
  'raw-missing',
  'raw-damaged',
  'too-large',
  'not-permitted',
] as const;
export type FactRefusal = (typeof FACT_REFUSALS)[number];

export interface RefusedFact {
  readonly id: string;
  /** `here`: it lies on this phone and did not go out; `there`: it lies on the server and was not taken. */
  readonly lies: 'here' | 'there';
  readonly reason: FactRefusal;
}

/** Where a team's database answers, e.g. "https://store.example/works-team", and who asks. */
export interface TeamStoreAccount {
  readonly url: string;
  readonly user: string;
  readonly password: string;
}

export interface TeamStoreProgress {
  /** `pausing`: the link was cut, the next attempt comes by itself. */
  readonly step: 'sending' | 'fetching' | 'pausing';
  /** Facts that the server has acknowledged, or that were kept here, in this run. */
  readonly doneCount: number;
  /** As far as it is known: it grows when the other side tells of more. */
  readonly totalCount: number;
}

export interface TeamStoreReport {
  readonly sentCount: number;
  readonly fetchedCount: number;
  readonly end: 'done' | 'cancelled' | TeamStoreProblem;
}

/** What is known of a team store without asking it. */
export interface TeamStoreStanding {
  /** ISO time of the last run that came to its end. */
  readonly lastSuccessAt?: string;
  /** Facts of this phone that the server has not acknowledged. */
  readonly waitingCount: number;
  readonly refused: readonly RefusedFact[];
}
