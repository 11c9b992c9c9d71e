import type { Mode } from '../model/analysis.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { modeOf } from './ambient/ambient-procedure.ts';
import { findRandomModes } from './ambient/find-random-modes.ts';
import { recordSpectra } from './ambient/record-spectra.ts';
import type { BandNature } from './tone-nature.ts';

/** A record shorter than this does not show a resonance's random envelope, s. */
const SHORTEST_S = 20;
/** Only bands within this power ratio of the strongest may be called modes. */
const STRONG_POWER_SHARE = 0.3;
/** Fitted centre and band's centre of power may differ by this share. */
const SAME_SHARE = 0.05;

/**
 * Resonances of a record in which no line drives anything: random envelope, and a fit by the likelihood of random excitation.
 * A machine's broad hump can look the same, so each carries a doubt; a tap or an ambient reading decides.
 */
export function randomModesBetween(signal: ConditionedSignal, random: readonly BandNature[]): Mode[] {
  if (!random.length || signal.facts.durationS < SHORTEST_S) return [];
  const strongest = Math.max(...random.map((band) => band.power));
  const spectra = recordSpectra(signal.grid.accelerationMps2, signal.grid.periodS);
  const found = findRandomModes(spectra, signal.facts.usableBandHz);
  return random
    .filter((band) => band.power >= STRONG_POWER_SHARE * strongest)
    .flatMap((band) => {
      const centreHz = band.frequenciesHz[0]!;
      const near = found.filter((m) => Math.abs(m.frequencyHz / centreHz - 1) < SAME_SHARE);
      return near.slice(0, 1).map((mode) => withRunningDoubt(modeOf(signal, mode)));
    })
    .sort((a, b) => b.amplitudeMps2 - a.amplitudeMps2);
}

const withRunningDoubt = (mode: Mode): Mode => ({ ...mode, doubts: [...mode.doubts, 'running-resonance'] });
