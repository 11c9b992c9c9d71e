import { ambientCase } from './ambient-case.ts';
import { coastdownCase } from './coastdown-case.ts';
import { seededRandom } from './random.ts';
import { runningCase } from './running-case.ts';
import { tapCase } from './tap-case.ts';
import { CASE_KINDS } from './truth.ts';
import type { CaseKind, GeneratedCase } from './truth.ts';

/**
 * One recording with its truth; the same kind, seed and index give the same record.
 * @param seed any integer; @param index 0, 1, 2...
 */
export function generateCase(kind: CaseKind, seed: number, index: number): GeneratedCase {
  const random = seededRandom(seed, CASE_KINDS.indexOf(kind) + 1, index);
  if (kind === 'B') return ambientCase(random, seed, index);
  if (kind === 'D') return coastdownCase(random, seed, index);
  if (kind.startsWith('A') && !kind.startsWith('ALIAS')) return tapCase(random, kind, seed, index);
  return runningCase(random, kind, seed, index);
}
