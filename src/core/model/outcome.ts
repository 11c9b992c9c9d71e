import type { Problem } from './problem.ts';

/** Result of something that may fail for a reason the person can act on. Misuse throws instead. */
export type Outcome<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: Problem };

export const success = <T>(value: T): Outcome<T> => ({ ok: true, value });
export const failure = (code: Problem['code'], facts: Problem['facts'] = {}): Outcome<never> => ({
  ok: false,
  problem: { code, facts },
});
