/** What an asset's pooled readings say, what to do next, and what changed between visits. */
import type {
  AssetVerdict,
  Coverage,
  NextStep,
  NextStepKind,
  PooledMode,
} from '../core/model/asset-verdict.ts';
import type { SpeedSeries, ToneOrigin } from '../core/model/guided-pairs.ts';
import type { Condition, QuantityChange, VisitChange } from '../core/model/visit-change.ts';
import { formatNumber } from './number.ts';
import { formatFrequencyRange } from './quantity.ts';
import { forcingName } from './sources.ts';
import { unpairedText } from './verdicts.ts';

const STEPS: Readonly<Record<NextStepKind, string>> = {
  'tap-first': 'Tap it: no reading here looks for modes yet.',
  'read-spot': 'Take a reading at this spot: it has none yet.',
  'repeat-poor': 'Repeat this reading: it is not to be trusted.',
  'settle-undecided':
    'Repeat this reading, with more taps or another phone: its uncertainty leaves the verdict open.',
  'add-spot':
    'Add a spot at a quarter of the span or in the middle: a mode does not move at its nodes and is missed there.',
  'other-direction': 'Tap in another direction: up and down, along, and across ring differently.',
  'read-running': 'Take a reading with the machine running.',
  'tap-stopped': 'Tap it with the machine stopped and locked out: a running reading rarely shows modes.',
};

/** @param spotName name of the step's spot, where it has one */
export function nextStepSentence(step: NextStep, spotName?: string): string {
  return spotName === undefined ? STEPS[step.kind] : `${spotName}: ${STEPS[step.kind]}`;
}

/** What the readings of an asset cover besides its spots: directions as the person named them, states of the machine. */
export function coverageSentence({ directions, hasRunning, hasStopped }: Coverage): string {
  const named = directions.length === 0 ? 'No direction was named' : `Directions: ${directions.join(', ')}`;
  const states = [hasRunning ? 'running' : '', hasStopped ? 'stopped' : ''].filter((state) => state !== '');
  return states.length === 0 ? `${named}.` : `${named}. Read ${states.join(' and ')}.`;
}

/** How far one mode differs from reading to reading beyond what each says of itself; undefined where nothing shows. */
export function scatterWords({
  frequencyBetweenHz,
}: Pick<PooledMode, 'frequencyBetweenHz'>): string | undefined {
  return frequencyBetweenHz > 0
    ? `they differ by ${formatNumber(frequencyBetweenHz, 2)} Hz (standard deviation) beyond their own uncertainty`
    : undefined;
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** The asset in one or two sentences: its worst pair, or that none was found near, and what is not covered. */
export function assetSentence(verdict: AssetVerdict): string {
  const worst = verdict.pairs[0];
  const missing = verdict.coverage.spotsMissing.length;
  const open =
    missing === 0 ? '' : ` ${missing} ${missing === 1 ? 'spot has' : 'spots have'} no reading yet.`;
  if (!worst) return `No sources are entered for it.${open}`;
  const name = capital(forcingName(worst.forcing));
  if (worst.verdict === 'none-near') return `No mode found near any source in the readings so far.${open}`;
  if (worst.verdict === 'blind' || worst.verdict === 'not-sought')
    return `${name}: ${unpairedText(worst.verdict).meaning}${open}`;
  return `${name}: ${worst.verdict}.${open}`;
}

const CONDITIONS: Readonly<Record<Condition, string>> = {
  mounting: 'how the phone was held',
  surface: 'the surface',
  excitation: 'how it was excited',
  machineState: 'the state of the machine',
  peopleOnIt: 'people on it',
  load: 'the load',
  temperatureC: 'the temperature',
  phoneMassKg: 'the weight of the phone',
  direction: 'the direction',
  visibleSway: 'visible sway',
  cracksOrLooseParts: 'cracks or loose parts',
  speedRpm: 'the speed',
};
export const conditionName = (condition: Condition): string => CONDITIONS[condition];

/** "Frequency: 6.8 % lower (4.1 to 9.4 %), more than visits usually scatter." What is not shown is never called the same. */
export function changeSentence(name: string, change: QuantityChange | undefined): string {
  if (!change) return `${name}: not found in both.`;
  const { ratio, interval, changed } = change;
  const percent = (value: number): string => formatNumber(100 * Math.abs(value - 1), 2);
  const scatter = change.floor === 'own' ? 'this spot’s own visits scatter' : 'visits usually scatter';
  const hidden = interval[1] - 1 > 1 - interval[0] ? interval[1] : interval[0];
  if (!changed)
    return `${name}: no change shown beyond what ${scatter}; up to ${percent(hidden)} % could hide.`;
  const [near, far] = ratio < 1 ? [interval[1], interval[0]] : interval;
  const direction = ratio < 1 ? 'lower' : 'higher';
  return `${name}: ${percent(ratio)} % ${direction} (${percent(near)} to ${percent(far)} %), more than ${scatter}.`;
}

/** What differs in the conditions of two visits, for beside the change. */
export function conditionsSentence(change: VisitChange): string | undefined {
  const degrees = change.temperatureDifferenceC;
  const warmer =
    degrees === undefined || Math.abs(degrees) < 0.5
      ? []
      : [`${formatNumber(Math.abs(degrees), 2)} °C ${degrees > 0 ? 'warmer' : 'colder'}`];
  const others = change.conditions.filter((condition) => condition !== 'temperatureC').map(conditionName);
  const all = [...warmer, ...others];
  return all.length === 0 ? undefined : `Different this time: ${all.join(', ')}.`;
}

/** What a series of speeds shows. */
export function speedSeriesSentence(series: SpeedSeries): string {
  switch (series.finding) {
    case 'resonance':
      return `The response peaks between ${Math.round(series.peakRpm?.[0] ?? 0)} and ${Math.round(series.peakRpm?.[1] ?? 0)} r/min (${formatFrequencyRange(series.peakHz ?? [0, 0])}) and falls on both sides: a resonance.`;
    case 'rising':
      return 'The response for a like unbalance still rises at the highest speed: a resonance lies there or above.';
    case 'falling':
      return 'The response for a like unbalance falls from the lowest speed on: a resonance lies there or below.';
    case 'flat':
      return 'No peak stands out over these speeds.';
  }
}

const WHOSE: Readonly<Record<ToneOrigin['whose'], string>> = {
  machine: 'Gone with the machine off: it is this machine’s.',
  elsewhere: 'Still there with the machine off: it comes from elsewhere.',
  both: 'Weaker with the machine off: part of it comes from elsewhere.',
  unknown: 'The reading with the machine off could not have shown it.',
};
export const toneOriginSentence = (origin: ToneOrigin): string => WHOSE[origin.whose];
