import type { SpecialistReason } from '../core/model/judgement.ts';

const REASONS: Readonly<Record<SpecialistReason, string>> = {
  'visible-sway': 'It sways visibly. Keep people off it and call a structural engineer now.',
  'cracks-or-loose': 'Cracks or loose parts were seen. Have them looked at before it is used further.',
  'level-beyond':
    'The level lies beyond the last boundary of a criterion, even as a lower bound. Have it measured with a calibrated instrument.',
  'coincident-people':
    'People can drive it at resonance with strong amplification. Ask a structural engineer what crowd and pace it can take.',
  'coincident-machine':
    'A machine can drive it at resonance with strong amplification. Ask a vibration specialist before it runs on at this speed.',
  'poor-trust-serious':
    'Something is at stake here and the reading is not to be trusted. Have it measured again by a specialist.',
};
/** Why to call a specialist, and whom. */
export const specialistText = (reason: SpecialistReason): string => REASONS[reason];
export const SPECIALIST_HEADING = 'Call a specialist';
