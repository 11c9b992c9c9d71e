import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { GeneratedCase } from './truth.ts';

/** Writes NAME.csv and NAME.json in the form that the shared scorer reads. */
export function writeCase(folder: string, generated: GeneratedCase): void {
  const { timeS, accelerationMps2 } = generated.recording;
  const rows = Array.from(
    timeS,
    (t, k) => `${t.toFixed(6)},${accelerationMps2.map((a) => (a[k] as number).toFixed(5)).join(',')}`,
  );
  writeFileSync(join(folder, `${generated.name}.csv`), `t_s,ax_mps2,ay_mps2,az_mps2\n${rows.join('\n')}\n`);
  writeFileSync(join(folder, `${generated.name}.json`), JSON.stringify(generated.truth, null, 1));
}
