import type { ModalValues } from '../core/model/guided-pairs.ts';
import type { Judgement, WayOut, WayOutKind } from '../core/model/judgement.ts';
import { formatInterval, formatNumber } from './number.ts';
import { formatFrequency, formatPercent, formatSpeed } from './quantity.ts';
import { forcingName } from './sources.ts';

const NAMES: Readonly<Record<WayOutKind, string>> = {
  speed: 'Another speed',
  stiffness: 'Stiffen it',
  mass: 'Add mass',
  damping: 'Add damping',
  isolation: 'Isolate',
};
export const wayOutName = (kind: WayOutKind): string => NAMES[kind];

const NOT_PRACTICAL = ' That is more than is commonly built.';

function change(way: WayOut): string {
  const factor = way.factor ? formatInterval(way.factor, 3) : '';
  const target = way.targetHz ? formatFrequency(way.targetHz[1]) : '';
  switch (way.kind) {
    case 'speed':
      return speed(way);
    case 'stiffness':
      return `Stiffness at the spot times ${factor} brings the mode up to ${target}.`;
    case 'mass':
      return `Modal mass at the spot times ${factor} brings the mode down to ${target}.`;
    case 'damping':
      return `A damping ratio of ${way.factor ? formatPercent(way.factor[1]) : ''} holds the response down.`;
    case 'isolation':
      return `Mounts at ${target}, deflecting ${formatNumber(1000 * (way.staticDeflectionM ?? 0), 2)} mm under the load, let ${way.factor ? formatInterval([100 * way.factor[0], 100 * way.factor[1]], 2) : ''} % through.`;
  }
}

function speed(way: WayOut): string {
  const bands = (way.keepOutRpm ?? [])
    .map(([low, high]) => `${Math.round(low)} to ${Math.round(high)}`)
    .join(', ');
  const keepOut = bands === '' ? '' : `Keep out of ${bands} r/min. `;
  return way.nearestSpeedRpm === undefined
    ? `${keepOut}No speed in its range is apart from every mode found.`
    : `${keepOut}The nearest speed that is apart is ${formatSpeed(way.nearestSpeedRpm)}.`;
}

function afterwards(way: WayOut): string {
  const amplified = way.amplificationAfter
    ? `, amplified at most ${formatNumber(way.amplificationAfter[1], 2)} times`
    : '';
  if (way.kind === 'isolation')
    return way.amplificationAfter
      ? ` The pair stays ${way.verdictAfter}, with at most ${formatNumber(way.amplificationAfter[1], 2)} times the static effect.`
      : '';
  const still = way.kind === 'damping' ? 'still ' : '';
  return way.kind === 'speed' && way.nearestSpeedRpm === undefined
    ? ''
    : ` Then ${still}${way.verdictAfter}${amplified}.`;
}

/** Names told in full; the rest are counted. */
const LONGEST_LIST_COUNT = 3;
function listed(names: readonly string[]): string {
  const once = [...new Set(names)];
  const rest = once.length - LONGEST_LIST_COUNT;
  const told = rest > 0 ? [...once.slice(0, LONGEST_LIST_COUNT), `${rest} more`] : once;
  return told.length < 2 ? told.join('') : `${told.slice(0, -1).join(', ')} and ${told.at(-1)}`;
}

function sideEffects(way: WayOut, judgement: Judgement): string {
  const worse = way.sideEffects.flatMap((index) => {
    const separation = judgement.separations[index];
    const forcing = separation && judgement.forcings[separation.forcingIndex];
    return forcing ? [forcingName(forcing)] : [];
  });
  const mounts = (way.mountsNearIndex ?? []).flatMap((index) => {
    const forcing = judgement.forcings[index];
    return forcing ? [forcingName(forcing)] : [];
  });
  const nearer = worse.length === 0 ? '' : ` But it comes nearer to ${listed(worse)}.`;
  const sits = mounts.length === 0 ? '' : ` But the mounts would sit near ${listed(mounts)}.`;
  return nearer + sits;
}

/** What a factor means in kilograms or newtons per metre, where an added-mass test gave the modal values. */
function inUnits(way: WayOut, modal: ModalValues | undefined): string {
  if (!modal || !way.factor) return '';
  const [low, high] = way.factor;
  if (way.kind === 'mass')
    return ` That is ${formatInterval([(low - 1) * modal.massIntervalKg[0], (high - 1) * modal.massIntervalKg[1]])} kg there.`;
  if (way.kind !== 'stiffness') return '';
  const perMm = modal.stiffnessIntervalNPerM.map((value) => value / 1000) as [number, number];
  return ` That is ${formatInterval([(low - 1) * perMm[0], (high - 1) * perMm[1]])} N/mm more there.`;
}

/**
 * What the change is, what the pair would then be, and what it does to others.
 * @param modal modal mass and stiffness of the spot, where an added-mass test gave them
 */
export function wayOutSentence(way: WayOut, judgement: Judgement, modal?: ModalValues): string {
  const practical = way.practical || way.kind === 'speed' ? '' : NOT_PRACTICAL;
  return `${change(way)}${inUnits(way, modal)}${afterwards(way)}${practical}${sideEffects(way, judgement)}`;
}
