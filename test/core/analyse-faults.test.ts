import { describe, expect, it } from 'vitest';
import { analyse } from '../../src/core/analyse.ts';
import { PROCEDURES } from '../../src/core/model/analysis.ts';
import { seededRandom } from '../support/cases/random.ts';
import { FAULTS, notFinite, spoiledRecording } from '../support/spoiled-recording.ts';
import { ringingRecording } from '../support/ringing-recording.ts';

const recording = ringingRecording({ frequencyHz: 7, dampingRatio: 0.02, tapTimesS: [2, 6], durationS: 10 });

/** The long form, in twos and on every kind of record, is `npm run soak -- analyse`. */
describe('faults of measured files: an answer or a refusal, every number finite, under every procedure', () => {
  it.each(Object.keys(FAULTS))('%s', (fault) => {
    const spoiled = spoiledRecording(recording, [fault], seededRandom(3));
    for (const procedure of [...PROCEDURES, 'auto'] as const)
      expect(notFinite(analyse(spoiled, { procedure, timing: 'auto' }))).toBeUndefined();
  });
});
