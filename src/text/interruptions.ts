import type { InterruptionCode } from '../core/model/recording.ts';

const SENTENCES: Readonly<Record<InterruptionCode, string>> = {
  hidden: 'The page was hidden, so the sensor stopped. What was recorded until then is kept.',
  frozen: 'The phone put the page to sleep. What was recorded until then is kept.',
  'sensor-error': 'The sensor stopped with an error. What was recorded until then is kept.',
  'permission-withdrawn':
    'Permission to read the motion sensor was withdrawn. What was recorded until then is kept.',
  'long-gap': 'The sensor was silent for too long. What was recorded before the gap is kept.',
  'wake-lock-lost': 'The screen may have switched off while recording: keep it awake next time.',
  'main-thread-stall': 'The phone was busy and held samples up for a moment: close other programs next time.',
  'recovered-after-crash': 'Recovered after the program was ended. The last two seconds may be missing.',
  'storage-failed': 'The phone could not store more. What was stored until then is kept: free some space.',
};
/** How a recording was cut or disturbed, in one sentence. */
export const interruptionSentence = (code: InterruptionCode): string => SENTENCES[code];
