import { gzipSync } from 'node:zlib';
import { afterEach, describe, it, expect, vi } from 'vitest';
import { gunzip, gzip, isGzip, sha256Of } from '../../src/store/raw-bytes.ts';

const text = new TextEncoder().encode('a rail that rings '.repeat(500));

afterEach(() => vi.unstubAllGlobals());

describe.each(['by the browser', 'by the library'] as const)('gzip %s', (way) => {
  const stub = () => {
    if (way === 'by the browser') return;
    vi.stubGlobal('CompressionStream', undefined);
    vi.stubGlobal('DecompressionStream', undefined);
  };

  it('packs and unpacks', async () => {
    stub();
    const packed = await gzip(text);
    expect(isGzip(packed)).toBe(true);
    expect(packed.length).toBeLessThan(text.length / 5);
    expect(await gunzip(packed)).toEqual(text);
  });

  it('refuses what would grow without end, what is cut and what is none', async () => {
    stub();
    const bomb = gzipSync(new Uint8Array(20_000_000));
    await expect(gunzip(bomb, 1_000_000)).rejects.toMatchObject({ code: 'damaged' });
    const packed = await gzip(text);
    await expect(gunzip(packed.subarray(0, packed.length - 20))).rejects.toMatchObject({ code: 'damaged' });
    await expect(gunzip(text)).rejects.toMatchObject({ code: 'damaged' });
  });
});

describe('sha256Of', () => {
  it('is the same with and without the browser', async () => {
    const byBrowser = await sha256Of(text);
    vi.stubGlobal('crypto', {});
    expect(await sha256Of(text)).toBe(byBrowser);
  });
});
