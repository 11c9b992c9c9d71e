import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { readTextFile } from '../../src/cli/read-text-file.ts';

const folder = mkdtempSync(join(tmpdir(), 'thrumbook-text-'));
afterAll(() => rmSync(folder, { recursive: true }));

function file(name: string, bytes: Uint8Array): string {
  writeFileSync(join(folder, name), bytes);
  return join(folder, name);
}

describe('readTextFile', () => {
  it.each([
    ['utf-8', Buffer.from('a (m/s²)', 'utf8')],
    ['utf-16 with its mark', Buffer.from('\ufeffa (m/s²)', 'utf16le')],
    ['old Western', Buffer.from('a (m/s²)', 'latin1')],
  ])('reads %s', async (name, bytes) => {
    expect(await readTextFile(file(name, bytes))).toEqual({ ok: true, value: 'a (m/s²)' });
  });

  it('refuses what is no text', async () => {
    const outcome = await readTextFile(file('picture', Buffer.from([0x89, 0x50, 0, 1, 2, 3])));
    expect(outcome).toMatchObject({ problem: { code: 'unreadable-file', facts: { reason: 'not-text' } } });
  });

  it('tells a file that is not there from a folder', async () => {
    expect(await readTextFile(join(folder, 'none'))).toMatchObject({
      problem: { facts: { reason: 'no-such-file' } },
    });
    expect(await readTextFile(folder)).toMatchObject({ problem: { facts: { reason: 'is-a-folder' } } });
  });
});
