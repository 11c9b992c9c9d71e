import type { Analysis, Levels } from '../model/analysis.ts';
import type { LevelFinding } from '../model/judgement.ts';
import type { Place } from '../model/place.ts';
import { foundationFindings, topFloorFindings } from './criteria/buildings.ts';
import { footbridgeFindings } from './criteria/footbridges.ts';
import { machineFindings } from './criteria/machines.ts';
import { comfortFindings, floorUseFindings } from './criteria/people.ts';

function findingsAt(place: Place, analysis: Analysis, levels: Levels): LevelFinding[] {
  const loaded = place.presumedLoading === true;
  switch (place.kind) {
    case 'bearing-housing':
      return machineFindings(levels, analysis.tones, place.machine);
    case 'foundation':
      return foundationFindings(analysis, levels, place.building);
    case 'top-floor':
      return topFloorFindings(analysis, levels, place.building);
    case 'footbridge':
      return [...footbridgeFindings(levels, loaded), ...comfortFindings(levels)];
    case 'floor':
      return [...floorUseFindings(levels, place.floorUse, loaded), ...comfortFindings(levels)];
    case 'stair':
      return comfortFindings(levels);
    case 'handrail':
    case 'machine-base':
    case 'fan-frame':
    case 'pipe':
    case 'other':
      return [];
  }
}

/**
 * The levels of a reading against the criteria that apply at its spot. Only for running and ambient readings: a tap measures the
 * inspector's hand, a coast-down a passing state. No spot, no criterion.
 */
export function levelFindings(analysis: Analysis, place: Place | undefined): readonly LevelFinding[] {
  const { levels, procedure } = analysis;
  if (!levels || !place || (procedure !== 'running' && procedure !== 'ambient')) return [];
  return findingsAt(place, analysis, levels);
}
