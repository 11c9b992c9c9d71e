import { PROCEDURES, type AnalysisSettings } from '../core/model/analysis.ts';
import type { AccelerationUnit } from '../core/packet/csv-units.ts';

export interface AnalyseArguments {
  readonly settings: AnalysisSettings;
  readonly unit?: AccelerationUnit;
  readonly sourcesPath?: string;
  readonly spotPath?: string;
  readonly files: readonly string[];
}

export const ANALYSE_USAGE = `npm run -s analyse -- [options] FILE...
  FILE                 recording as CSV or TSV with a header, e.g. t_s,ax_mps2,ay_mps2,az_mps2
                       or a packet (.zip) or report (.html): each reading again, beside what was stored with it
  --procedure tap|running|ambient|coastdown|auto   how it was taken (default auto)
  --timing auto|stamps|clock   whether the time stamps are true or late reports of a steady clock (default auto)
  --unit mps2|g|mg     unit of acceleration (default: from the header, else m/s²)
  --sources FILE.json  what shakes it: every mode is judged against every forcing
  --spot FILE.json     what the spot is, e.g. {"kind":"floor","floorUse":"office"}: levels are held against guidance
Prints one line of JSON per file. Exit status: 0 all analysed, 3 some could not be, 2 wrong use.`;

const CHOICES: Readonly<Record<string, readonly string[]>> = {
  '--procedure': [...PROCEDURES, 'auto'],
  '--timing': ['auto', 'stamps', 'clock'],
  '--unit': ['mps2', 'g', 'mg'],
};

/** Reads the arguments of the analysis command; a string says what is wrong with them. */
export function parseAnalyseArguments(args: readonly string[]): AnalyseArguments | string {
  const options = new Map<string, string>();
  const files: string[] = [];
  for (let i = 0; i < args.length; i++) {
    const arg = args[i]!;
    if (arg === '--') return withFiles(options, [...files, ...args.slice(i + 1)]);
    if (!arg.startsWith('--')) {
      files.push(arg);
      continue;
    }
    const [name = arg, inline] = arg.split(/=(.*)/s);
    const value = inline ?? args[++i];
    const choices = CHOICES[name];
    if (!choices && name !== '--sources' && name !== '--spot') return `Unknown option ${name}.`;
    if (value === undefined) return `${name} needs a value.`;
    if (choices && !choices.includes(value))
      return `${name} must be one of ${choices.join(', ')}, not "${value}".`;
    options.set(name, value);
  }
  return withFiles(options, files);
}

function withFiles(
  options: ReadonlyMap<string, string>,
  files: readonly string[],
): AnalyseArguments | string {
  if (files.length === 0) return 'Name at least one file.';
  const unit = options.get('--unit');
  const sourcesPath = options.get('--sources');
  const spotPath = options.get('--spot');
  return {
    settings: {
      procedure: (options.get('--procedure') ?? 'auto') as AnalysisSettings['procedure'],
      timing: (options.get('--timing') ?? 'auto') as AnalysisSettings['timing'],
    },
    ...(unit === undefined ? {} : { unit: unit as AccelerationUnit }),
    ...(sourcesPath === undefined ? {} : { sourcesPath }),
    ...(spotPath === undefined ? {} : { spotPath }),
    files,
  };
}
