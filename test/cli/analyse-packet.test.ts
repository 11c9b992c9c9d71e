import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { analyse } from '../../src/core/analyse.ts';
import type { Analysis } from '../../src/core/model/analysis.ts';
import type { ReadingFact } from '../../src/core/model/fact.ts';
import { packetBlock } from '../../src/core/packet/packet-in-report.ts';
import { encodeRaw } from '../../src/core/packet/raw-recording.ts';
import { sha256Hex } from '../../src/core/packet/sha256.ts';
import { storedNumbers } from '../../src/core/packet/stored-numbers.ts';
import { readingDraft } from '../support/reading-draft.ts';
import { ringingRecording } from '../support/ringing-recording.ts';
import { joined, packetOf, sampleId } from '../support/sample-packet.ts';

const folder = mkdtempSync(join(tmpdir(), 'thrumbook-packet-'));
afterAll(() => rmSync(folder, { recursive: true }));

const recording = ringingRecording({
  frequencyHz: 7.4,
  dampingRatio: 0.012,
  tapTimesS: [2, 8, 14],
  durationS: 20,
  scatterS: 0.002,
});
const raw = encodeRaw(recording);

function readingOf(index: number, analysis: Analysis, bytes = raw): ReadingFact {
  const fact = readingDraft({ analysis: storedNumbers(analysis) });
  return {
    ...fact,
    _id: sampleId('reading', index),
    v: 1,
    kind: 'reading',
    rawSha256: sha256Hex(bytes),
    rawBytes: bytes.length,
  };
}

const settings = { procedure: 'tap', timing: 'auto' } as const;
const result = analyse(recording, settings);
if (!result.ok) throw new Error(result.problem.code);
const { analysis } = result.value;
const honest = readingOf(1, analysis);
const [mode] = analysis.modes;
const polished = readingOf(2, { ...analysis, modes: [{ ...mode!, dampingRatio: 0.05 }] });
const other = { ...readingOf(3, analysis), rawSha256: 'f'.repeat(64) };
const raws = new Map([honest, polished, other].map(({ _id }) => [_id, raw]));
const packet = await packetOf([honest, polished, other], raws);

function run(name: string, bytes: Uint8Array | string) {
  const path = join(folder, name);
  writeFileSync(path, bytes);
  const { stdout, status } = spawnSync(process.execPath, ['--import', 'tsx', 'src/cli/analyse.ts', path], {
    encoding: 'utf8',
  });
  const lines = stdout.trim().split('\n');
  return { path, status, lines: lines.map((line) => JSON.parse(line) as Record<string, unknown>) };
}

describe('analyse PACKET', () => {
  it('prints each reading again beside what was stored, tells changed numbers, and names changed samples', () => {
    const { path, status, lines } = run('a.thrumbook.zip', packet);
    expect(status).toBe(3);
    expect(lines).toHaveLength(3);
    expect(lines[0]).toMatchObject({
      file: `${path}#${honest._id}`,
      equal: true,
      rawSha256: honest.rawSha256,
      stored: { modes: [{ frequencyHz: honest.analysis.modes[0]!.frequencyHz }] },
    });
    expect(storedNumbers(lines[0]!['analysis'])).toMatchObject({ ...honest.analysis });
    expect(lines[1]).toMatchObject({ file: `${path}#${polished._id}`, equal: false });
    expect(lines[2]).toMatchObject({
      file: `${path}#raw/${other._id.slice(8)}.thr`,
      problem: { code: 'damaged', reason: 'samples-hash' },
    });
  });

  it('reads a report that carries a packet the same way, and says of another page that it carries none', () => {
    const text = (words: string) => new TextEncoder().encode(words);
    const page = joined([text('<!doctype html><p>A report'), ...packetBlock(packet), text('</html>')]);
    const { lines } = run('report.html', page);
    expect(lines.map((line) => line['equal'])).toEqual([true, false, undefined]);
    const empty = run('page.html', '<!doctype html><p>Nothing');
    expect(empty.status).toBe(3);
    expect(empty.lines[0]).toMatchObject({ problem: { code: 'unreadable-file', reason: 'no-packet' } });
  });
});
