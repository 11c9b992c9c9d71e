/** The sentence that comes before the picture. */
import type { Analysis, Mode, Tone } from '../core/model/analysis.ts';
import type { Trust } from '../core/model/doubt.ts';
import type { Judgement, Separation } from '../core/model/judgement.ts';
import { formatNumber } from './number.ts';
import { formatAcceleration, formatDamping, formatFrequency, type FrequencyUnit } from './quantity.ts';
import { forcingName } from './sources.ts';

const TRUST: Readonly<Record<Trust, string>> = { good: 'good', fair: 'fair', poor: 'poor' };
export const trustWord = (trust: Trust): string => TRUST[trust];

const capitalised = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** "Rings at 7.42 Hz ± 0.03, damping 1.1 % ± 0.2." */
export function modeSentence(mode: Mode, unit: FrequencyUnit = 'Hz'): string {
  const frequency = formatFrequency(mode.frequencyHz, mode.frequencySdHz, unit);
  const damping = formatDamping(mode.dampingRatio, mode.dampingRatioSd);
  const likely = mode.fold.candidatesHz[0] ?? mode.frequencyHz;
  if (mode.fold.verdict === 'folded')
    return `Rings at about ${formatFrequency(likely, undefined, unit)}, seen folded at ${frequency}.`;
  if (mode.fold.verdict === 'undecided')
    return `Shows a mode at ${frequency}, which may be the folded image of a higher one.`;
  return `Rings at ${frequency}, damping ${damping}.`;
}

function toneSentence(tone: Tone, unit: FrequencyUnit): string {
  const frequency = formatFrequency(tone.frequencyHz, tone.frequencySdHz, unit);
  const amplitude = formatAcceleration(tone.amplitudeMps2, tone.amplitudeSdMps2);
  const likely = tone.fold.candidatesHz[0] ?? tone.frequencyHz;
  if (tone.fold.verdict === 'folded')
    return `Strongest tone at about ${formatFrequency(likely, undefined, unit)}, seen folded at ${frequency}, amplitude ${amplitude}.`;
  if (tone.fold.verdict === 'undecided')
    return `Strongest tone seen at ${frequency}, amplitude ${amplitude}; it may be the folded image of a higher one.`;
  return `Strongest tone at ${frequency}, amplitude ${amplitude}.`;
}

const NOTHING: Readonly<Record<Analysis['procedure'], string>> = {
  tap: 'No mode found in this reading.',
  ambient: 'No mode found in this reading.',
  running: 'No tone found in this reading.',
  coastdown: 'No resonance found in the range that the machine passed through.',
};

/**
 * How near, in words: "comes within 3 %", "lies 12 % below it", "falls on it".
 * @param which the mode, where it is not the one just named
 */
export function nearnessWords(separation: Separation, which = ''): string {
  const { nearestRatio, verdict } = separation;
  const offset = Math.abs(nearestRatio - 1);
  if (offset < 0.005) return `falls on ${which || 'it'}`;
  if (verdict === 'coincident' || verdict === 'undecided')
    return `comes within ${Math.ceil(100 * offset - 0.01)} %${which && ` of ${which}`}`;
  const percent = formatNumber(100 * offset, offset < 0.1 ? 1 : 2);
  return `lies ${percent} % ${nearestRatio < 1 ? 'below' : 'above'} ${which || 'it'}`;
}

/** "The third harmonic of walking comes within 3 %: coincident." */
function pairSentence(separation: Separation, analysis: Analysis, judgement: Judgement): string {
  const forcing = judgement.forcings[separation.forcingIndex];
  const name = capitalised(forcing ? forcingName(forcing) : separation.source);
  const which = separation.modeIndex === 0 ? '' : `the mode at ${formatFrequency(separation.modeHz)}`;
  if (separation.verdict !== 'undecided')
    return `${name} ${nearnessWords(separation, which)}: ${separation.verdict}.`;
  const fold = analysis.modes[separation.modeIndex]?.fold.verdict;
  return fold === 'undecided'
    ? `${name} ${nearnessWords(separation, which)}, if what is seen is no folded image: undecided.`
    : `${name} may fall on ${which || 'it'} or lie clear of it: undecided.`;
}

const count = (number: number, one: string, many: string): string =>
  number === 1 ? `one ${one}` : `${number} ${many}`;

const isNear = ({ verdict }: Separation): boolean => verdict !== 'apart' && verdict !== 'blind';
const isCoincident = ({ verdict, atFaceValue }: Separation): boolean =>
  verdict === 'coincident' || atFaceValue === 'coincident';

/** The pair to speak of: a coincidence of the strongest mode, which was just named; else the worst coincidence; else the worst pair. */
export function headlinePair(separations: readonly Separation[]): Separation | undefined {
  const near = separations.filter(isNear);
  const coincident = near.filter(isCoincident);
  return coincident.find(({ modeIndex }) => modeIndex === 0) ?? coincident[0] ?? near[0];
}

/** What the sources mean for the reading: the worst pair, or what was not seen, or that nothing was found near. */
export function sourcesSentence(analysis: Analysis, judgement: Judgement): string | undefined {
  if (judgement.forcings.length === 0) return undefined;
  const pair = headlinePair(judgement.separations);
  if (pair) return pairSentence(pair, analysis, judgement);
  if (analysis.procedure === 'running') return runningSentence(judgement);
  if (analysis.modes.length === 0) return 'Whether a source falls on one stays open.';
  return [noneNearSentence(judgement), ...blowSentences(judgement)].filter((part) => part !== '').join(' ');
}

/** Nothing near: said of the sources that could have been near, with what the recording was blind to. */
function noneNearSentence(judgement: Judgement): string {
  const blows = new Set(judgement.impulsive.map(({ source }) => source));
  if (judgement.forcings.every(({ source }) => blows.has(source))) return '';
  const blind = judgement.unpaired.filter(({ verdict }) => verdict === 'blind').length;
  const none = 'No mode found near any source in this reading';
  return blind === 0 ? `${none}.` : `${none}, and it was blind to ${count(blind, 'forcing', 'forcings')}.`;
}

/** Sources whose steps meet the strongest mode as single blows. */
const blowSentences = (judgement: Judgement): string[] =>
  judgement.impulsive.filter(({ modeIndex }) => modeIndex === 0).map(({ source }) => blowSentence(source));

/** A mode above the range in which steps build up a response. */
export const blowSentence = (source: string): string =>
  `Steps of ${source} meet it as single blows that ring out before the next: no resonance verdict applies.`;

function runningSentence(judgement: Judgement): string {
  const first = judgement.toneMatches[0];
  if (!first) return 'A running reading rarely shows modes: tap the spot with the machine stopped.';
  if (!first.forcing) return 'No source entered here explains it.';
  const how = first.folded ? 'It fits the folded image of' : 'It fits';
  return `${how} ${forcingName(first.forcing)}.`;
}

export interface SentenceOptions {
  readonly frequencyUnit?: FrequencyUnit;
}

/** What rings, or hums, in one sentence. */
export function headlineSentence(analysis: Analysis, options: SentenceOptions = {}): string {
  const unit = options.frequencyUnit ?? 'Hz';
  const mode = analysis.modes[0];
  const tone = analysis.tones[0];
  if (mode && (analysis.procedure !== 'running' || !tone)) return modeSentence(mode, unit);
  if (tone) return toneSentence(tone, unit);
  return NOTHING[analysis.procedure];
}

/**
 * The verdict sentence of a reading: what rings, what drives it, whether to trust it.
 * @param judgement absent: no sources held against it; the trust is then the analysis's own
 */
export function verdictSentence(
  analysis: Analysis,
  judgement?: Judgement,
  options: SentenceOptions = {},
): string {
  const sources = judgement && sourcesSentence(analysis, judgement);
  const trust = judgement?.trust ?? analysis.trust;
  return [headlineSentence(analysis, options), sources, `Trust: ${trustWord(trust)}.`]
    .filter((part) => part !== undefined)
    .join(' ');
}
