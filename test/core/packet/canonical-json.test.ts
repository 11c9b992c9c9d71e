import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import { canonicalJson, wellFormedText } from '../../../src/core/packet/canonical-json.ts';

describe('canonicalJson', () => {
  it('sorts keys by UTF-16 code units: example of RFC 8785, section 3.2.3', () => {
    const value = {
      '\u20ac': 'Euro Sign',
      '\r': 'Carriage Return',
      '\ufb33': 'Hebrew Letter Dalet With Dagesh',
      '1': 'One',
      '\ud83d\ude00': 'Emoji: Grinning Face',
      '\u0080': 'Control',
      '\u00f6': 'Latin Small Letter O With Diaeresis',
    };
    const keys = Object.keys(JSON.parse(canonicalJson(value)) as object);
    // JSON.parse puts integer keys first, so the order is read from the text.
    const order = [...canonicalJson(value).matchAll(/"([^"]+)":/g)].map((match) => match[1]);
    expect(keys).toHaveLength(7);
    expect(order).toEqual(['\\r', '1', '\u0080', '\u00f6', '\u20ac', '\ud83d\ude00', '\ufb33']);
  });

  it('writes numbers as RFC 8785, section 3.2.2 and appendix B do', () => {
    const numbers = [333333333.33333329, 1e30, 4.5, 2e-3, 1e-27, 0, -0, 5e-324, 9007199254740992, 1e21];
    expect(canonicalJson(numbers)).toBe(
      '[333333333.3333333,1e+30,4.5,0.002,1e-27,0,0,5e-324,9007199254740992,1e+21]',
    );
  });

  it('escapes texts as section 3.2.2.2 does', () => {
    expect(canonicalJson('\u20ac$\u000f\nA\'B"\\\\"/')).toBe('"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"');
  });

  it('leaves undefined members out and refuses what JSON cannot hold', () => {
    expect(canonicalJson({ a: undefined, b: [null, true] })).toBe('{"b":[null,true]}');
    for (const bad of [Number.NaN, Infinity, '\ud800', { a: '\udc00x' }, () => 1, new Date(0), [undefined]]) {
      expect(() => canonicalJson(bad)).toThrow(TypeError);
    }
  });

  it('is one text for one content, whatever the order of keys (property)', () => {
    fc.assert(
      fc.property(fc.jsonValue({ noUnicodeString: true }), (value) => {
        const turned = reversedKeys(value);
        expect(canonicalJson(turned)).toBe(canonicalJson(value));
        expect(JSON.parse(canonicalJson(value))).toEqual(JSON.parse(JSON.stringify(value)));
      }),
      { numRuns: 200 },
    );
  });
});

describe('wellFormedText', () => {
  it('mends half an emoji and composes accents', () => {
    expect(wellFormedText('rail \ud83d')).toBe('rail \ufffd');
    expect(wellFormedText('\ud83d\ude00 u\u0308')).toBe('\ud83d\ude00 ü');
  });
});

function reversedKeys(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(reversedKeys);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .reverse()
      .map(([key, item]) => [key, reversedKeys(item)]),
  );
}
