import 'fake-indexeddb/auto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ReportContent, ReportReading } from '../../src/app/ports.ts';
import { judge } from '../../src/core/survey/judge.ts';
import { REPORT_CSS } from '../../src/exchange/report/report-style.ts';
import { reportPage, type ReportFrame } from '../../src/exchange/report/report-page.ts';
import { cautionText } from '../../src/text/cautions.ts';
import { INDICATIVE_LINE } from '../../src/text/indicative.ts';
import { phone, takeIn, watch } from '../support/exchange-of.ts';
import { readingDraft, sampleRecording } from '../support/reading-draft.ts';
import { READING_EXAMPLES, type ReadingExample } from '../support/reading-examples.ts';

const units = {
  frequency: 'Hz',
  acceleration: 'm/s²',
  velocity: 'mm/s',
  displacement: 'µm',
} as const;
const frame: ReportFrame = {
  tokensCss: '',
  madeAt: '2026-12-01T15:00:00.000Z',
  timeZone: 'Europe/Lisbon',
  about: { version: '0.1.0', commit: 'abc1234', analysisVersion: 1 },
  isPacket: true,
};

function reportReading(example: ReadingExample, over: Partial<ReportReading> = {}): ReportReading {
  const analysis = example.results.at(-1)?.analysis ?? example.reading.analysis;
  const judgement = judge(analysis, example.sources, example.reading.circumstances, {
    place: { kind: 'handrail' },
  });
  return {
    reading: example.reading,
    analysis,
    judgement,
    sources: example.sources,
    names: example.place,
    photos: [],
    axes: ['x', 'y', 'z'],
    ...over,
  };
}
const page = (...readings: ReportReading[]) => reportPage({ readings, units }, frame);
const [stair] = READING_EXAMPLES;
const allReadings = READING_EXAMPLES.map((example) => reportReading(example));

describe('reportPage', () => {
  it('carries every stored number of modes and tones with all its digits', () => {
    const stated = new Set(
      [...page(...allReadings).matchAll(/<data[^>]* value="([^"]*)"/g)].map((match) => Number(match[1])),
    );
    for (const { analysis } of allReadings) {
      for (const mode of analysis.modes)
        for (const value of [mode.frequencyHz, mode.frequencySdHz, mode.dampingRatio, mode.dampingRatioSd])
          expect(stated).toContain(value);
      for (const tone of analysis.tones)
        for (const value of [tone.frequencyHz, tone.amplitudeMps2]) expect(stated).toContain(value);
    }
  });

  it('says sentence, trust, specialist, hash, versions; cautions and the indicative line in the foot', () => {
    const reading = reportReading(stair!);
    const text = page(reading);
    const foot = /<tfoot>(.*?)<\/tfoot>/s.exec(text)![1]!;
    expect(foot).toContain(INDICATIVE_LINE);
    for (const code of reading.judgement.cautions) expect(foot).toContain(cautionText(code).text);
    for (const said of ['Rings at 7.42', 'Trust good', 'Call a specialist', reading.reading.rawSha256])
      expect(text).toContain(said);
    expect(text).toContain('analysis version 1');
  });

  it('prints the first photos, the first beside the ladder', () => {
    const jpeg = (last: number) => new Uint8Array([0xff, 0xd8, 0xff, last]);
    const text = page(reportReading(stair!, { photos: [1, 2, 3, 4, 5].map(jpeg) }));
    const shown = [...text.matchAll(/<img\s+src="data:image\/jpeg;base64,([^"]*)"/g)].map(([, data]) => data);
    expect(shown).toEqual([1, 2, 3, 4].map((last) => Buffer.from(jpeg(last)).toString('base64')));
    expect(text.indexOf(shown[0]!)).toBeLessThan(text.indexOf('What was found'));
  });

  it('loads and runs nothing', () => {
    const text = page(...allReadings);
    expect(text).not.toMatch(
      /<script|javascript:|\son\w+=|<link|<iframe|url\(|@import|https?:\/\/(?!www\.w3\.org\/2000\/svg)/i,
    );
    expect(text).toContain("default-src 'none'");
    expect(REPORT_CSS).not.toMatch(/url\(|@import/);
  });

  it('escapes whatever people typed: no text changes the skeleton of the page', () => {
    const skeleton = (text: string) => [...text.matchAll(/<\/?[a-z][^>]*>/gi)].length;
    const plain = skeleton(
      page(reportReading(stair!, { notes: 'a', label: 'b', names: { spot: 'c', site: 'd' } })),
    );
    const nasty = fc.oneof(
      fc.string(),
      fc.constantFrom(
        '</td></table><script>alert(1)</script>',
        '"><img src=x onerror=alert(1)>',
        '<!--',
        ']]>',
      ),
    );
    const property = fc.property(nasty, nasty, nasty, nasty, (notes, label, spot, site) => {
      const given = reportReading(stair!, {
        notes: `n${notes}`,
        label: `l${label}`,
        names: { spot: `s${spot}`, site: `t${site}` },
      });
      expect(skeleton(page(given))).toBe(plain);
    });
    fc.assert(property, { numRuns: 30 });
  });
});

describe('report file', () => {
  it('is one page that is taken in like a packet: the same facts, the same samples', async () => {
    const from = await phone();
    const reading = await from.store.saveReading(readingDraft(), sampleRecording(240), { label: 'Post 3' });
    const content: ReportContent = {
      units,
      readings: [reportReading(stair!, { reading, analysis: reading.analysis, label: 'Post 3' })],
    };
    const file = await from.exchange.report(content, watch());
    expect(file.type).toBe('text/html');
    expect(file.name).toBe('thrumbook-report-quay-mill-2026-03-02.html');
    const to = await phone();
    expect(await takeIn(to.exchange, file)).toBe(2);
    expect((await to.store.openReading(reading._id))?.reading).toEqual(reading);
    expect(await to.store.rawOf(reading._id)).toEqual(await from.store.rawOf(reading._id));
    expect(await takeIn(to.exchange, file)).toBe(0);
    const cut = await to.exchange.preview(file.slice(0, file.size - 3000), watch());
    expect(cut.ok && cut.value.refused.length).toBeGreaterThan(0);
  });
});
