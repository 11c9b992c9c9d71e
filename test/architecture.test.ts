import { describe, expect, it } from 'vitest';
import { importCycles, sourceFiles, withoutComments, type SourceFile } from './support/source-files.ts';

const SRC = 'src';
const files = sourceFiles(SRC);

interface Layer {
  /** Folder or file of src/; the first that fits is the file's layer. */
  readonly within: string;
  /** Folders and files it may import besides its own. */
  readonly sees: readonly string[];
  readonly packages?: readonly string[];
  /** Files that it may import types from. */
  readonly types?: readonly string[];
}

const PORTS = 'app/ports.ts';
const UI_PACKAGES = ['preact', 'uplot'];

/** The import table of DEVELOPERS.md. */
const LAYERS: readonly Layer[] = [
  { within: 'core/model/', sees: [] },
  { within: 'core/signal/', sees: ['core/model/'], packages: ['fft.js'] },
  { within: 'core/modes/', sees: ['core/signal/', 'core/model/'] },
  { within: 'core/survey/', sees: ['core/model/'], packages: ['valibot'] },
  { within: 'core/packet/', sees: ['core/model/'], packages: ['valibot', 'fflate'] },
  { within: 'core/picture/', sees: ['core/model/'] },
  { within: 'core/', sees: ['core/'] },
  { within: 'text/', sees: ['core/model/', 'core/picture/'] },
  { within: 'worker/', sees: ['core/'], types: [PORTS] },
  { within: 'capture/', sees: ['core/'], types: [PORTS] },
  { within: 'store/', sees: ['core/'], packages: ['idb', 'fflate', 'valibot'], types: [PORTS] },
  { within: 'exchange/', sees: ['core/', 'text/'], packages: ['fflate', 'valibot', 'idb'], types: [PORTS] },
  { within: 'app/', sees: ['core/', 'text/'], packages: ['workbox-window'] },
  {
    within: 'ui/components/',
    sees: ['core/model/', 'core/picture/', 'text/', 'ui/charts/'],
    packages: UI_PACKAGES,
  },
  {
    within: 'ui/charts/',
    sees: ['core/model/', 'core/picture/', 'text/', 'ui/components/'],
    packages: UI_PACKAGES,
  },
  { within: 'ui/', sees: ['app/', 'core/model/', 'core/picture/', 'text/'], packages: UI_PACKAGES },
  { within: 'cli/', sees: ['core/', 'text/'], packages: ['vite'] },
  { within: 'main.tsx', sees: [''], packages: ['preact'] },
];

const layerOf = (path: string): Layer | undefined => LAYERS.find((layer) => path.startsWith(layer.within));

function breaches(file: SourceFile): string[] {
  const layer = layerOf(file.path);
  if (!layer) return file.path.endsWith('.css') ? [] : [`${file.path} is in no layer`];
  return file.imports.flatMap(({ target, isOwn, isTypeOnly }) => {
    const isAllowed = isOwn
      ? [layer.within, ...layer.sees].some((prefix) => target.startsWith(prefix)) ||
        (isTypeOnly && (layer.types ?? []).includes(target))
      : (layer.packages ?? []).includes(target) || (layer.within === 'cli/' && target.startsWith('node:'));
    return isAllowed ? [] : [`${file.path} imports ${target}`];
  });
}

describe('imports', () => {
  it('are read at all', () => {
    expect(files.length).toBeGreaterThan(30);
    expect(files.flatMap((file) => file.imports).length).toBeGreaterThan(30);
  });

  it('go inward only, as the import table says', () => {
    expect(files.flatMap(breaches)).toEqual([]);
  });

  it('have no cycle', () => {
    expect(importCycles(files)).toEqual([]);
  });

  it('use each outside library of the core in one file only: fft.js', () => {
    const users = files.filter((file) => file.imports.some((i) => i.target === 'fft.js')).map((f) => f.path);
    expect(users.length).toBeLessThanOrEqual(1);
  });
});

describe('core and text', () => {
  it('know no clock, no chance and no host', () => {
    const forbidden =
      /(?<![.\w'"])(Date|performance|document|navigator|globalThis|process|crypto|setTimeout|setInterval|require|fetch|localStorage|indexedDB)\b(?!\s*[:?'"])|Math\.random/;
    const offenders = files
      .filter((file) => /^(core|text)\/.*\.ts$/.test(file.path))
      .flatMap((file) =>
        withoutStrings(withoutComments(file.text))
          .split('\n')
          .flatMap((line, i) => (forbidden.test(line) ? [`${file.path}:${i + 1} ${line.trim()}`] : [])),
      );
    expect(offenders).toEqual([]);
  });
});

function withoutStrings(text: string): string {
  return text.replace(/'(?:\\.|[^'\\\n])*'|"(?:\\.|[^"\\\n])*"|`(?:\\.|[^`\\])*`/g, "''");
}

/** Units (and what stands for one) that a numeric field's name ends in. */
const UNIT =
  /(Hz|HzPerS|[a-z]S|Ms|Us|Mps|Mps2|Mps2PerRootHz|Mps4PerHz|M|Mm|Px|Kg|KgPerM|C|W|N|NPerM|Rad|Deg|Db|Rpm|Ratio|RatioSd|Share|Count|Index|Indexes|Order|Bytes|Version)$/;
/** Numbers whose unit is none, or stands beside them in a field `unit`. */
const WITHOUT_UNIT = new Set([
  'v',
  'version',
  'direction',
  'up',
  'order',
  'orders',
  'poles',
  'cylinders',
  'harmonics',
  'ratio',
  'interval',
  'value',
  'limit',
  'factor',
  'sideEffects',
  'mountsNear',
  'facts',
  'bound',
  'amplificationAfter',
]);

describe('model', () => {
  it('names the unit of every numeric field', () => {
    const field =
      /^\s*(?:readonly\s+)?(\w+)\??:\s*([^;{]*\b(?:number|Interval|Float64Array|Float32Array)\b[^;]*);/gm;
    const nameless = files
      .filter((file) => file.path.startsWith('core/model/'))
      .flatMap((file) =>
        [...withoutComments(file.text).matchAll(field)]
          .map((match) => match[1]!)
          .filter((name) => !UNIT.test(name) && !WITHOUT_UNIT.has(name))
          .map((name) => `${file.path}: ${name}`),
      );
    expect(nameless).toEqual([]);
  });
});

describe('styles', () => {
  it('name colours in the tokens file only', () => {
    const colour =
      /(?<=[\s'"`:(,>])#(?:[0-9a-f]{8}|[0-9a-f]{6}|[0-9a-f]{3})\b(?!\()|\b(?:rgba?|hsla?|hwb|lab|lch|oklab|oklch)\(|:\s*(?:black|white|red|green|blue|gr[ae]y|silver|orange|yellow|purple|navy)\b(?=\s*[;}])/i;
    const offenders = files
      .filter((file) => file.path !== 'ui/styles/tokens.css')
      .flatMap((file) =>
        withoutComments(file.text)
          .split('\n')
          .flatMap((line, i) => (colour.test(line) ? [`${file.path}:${i + 1} ${line.trim()}`] : [])),
      );
    expect(offenders).toEqual([]);
  });
});
