import { describe, expect, it } from 'vitest';
import { parseSource } from '../../../src/app/survey-desk.ts';
import { SOURCE_KINDS, type Source } from '../../../src/core/model/source.ts';
import { officeText } from '../../../src/text/office-screens.ts';
import {
  draftToData,
  emptyDraft,
  parseRange,
  sourceToDraft,
} from '../../../src/ui/screens/sources/source-draft.ts';
import { SOURCE_FIELDS } from '../../../src/ui/screens/sources/source-fields.ts';

const SOURCES: readonly Source[] = [
  {
    kind: 'machine',
    name: 'Pump',
    speedRpm: [900, 1500],
    variableSpeed: true,
    bladeCount: 5,
    orders: [1, 2, 3],
  },
  { kind: 'belt', name: 'Drive', speedRpm: 1480, pulleyDiameterM: 0.12, beltLengthM: 1.25 },
  { kind: 'mains', name: 'Motor', supplyHz: 50, poles: 4, speedRpm: 1475 },
  { kind: 'footfall', name: 'Walkers', activity: 'walking', paceHz: [1.6, 2.4], peopleCount: 2 },
  { kind: 'wind', name: 'Wind', widthM: 0.048, speedMps: [2, 15], shape: 'circle' },
  { kind: 'traffic', name: 'Road', traffic: 'road' },
  { kind: 'band', name: 'Hum', frequencyHz: 12.5, harmonics: 2, through: 'base' },
];

describe('the form of a source', () => {
  it.each(SOURCES)('gives $name back as it was', (source) => {
    expect(parseSource(draftToData(sourceToDraft(source), 'unnamed'))).toEqual({ ok: true, value: source });
  });

  it('needs no typing where the usual range is enough', () => {
    for (const kind of ['footfall', 'mains', 'traffic'] as const)
      expect(parseSource(draftToData(emptyDraft(kind), 'unnamed')).ok).toBe(true);
  });

  it('hands a text that is no number to the parser, which says what is wrong', () => {
    const draft = { ...emptyDraft('machine'), typed: { speedRpm: 'fast' } };
    expect(parseSource(draftToData(draft, 'Machine'), 0)).toMatchObject({
      ok: false,
      problem: { code: 'bad-source', facts: { field: 'speedRpm' } },
    });
  });

  it.each([
    ['900-1500', [900, 1500]],
    ['1,6 – 2,4', [1.6, 2.4]],
    ['2 to 15', [2, 15]],
    ['1480', 1480],
    ['900-', undefined],
  ])('reads %j', (typed, value) => {
    expect(parseRange(typed)).toEqual(value);
  });

  it('has words for every field', () => {
    for (const kind of SOURCE_KINDS)
      for (const { key } of SOURCE_FIELDS[kind])
        expect(Object.keys(officeText.sources.fields)).toContain(key);
  });
});
