/** The worker's own entry: nothing but the analysis behind the protocol. */
import { analyse } from '../core/analyse.ts';
import { phoneCheck } from '../core/phone-check.ts';
import { serveAnalysis } from './protocol.ts';
import type { MessageEnd } from './protocol.ts';

serveAnalysis(self as unknown as MessageEnd, { analyse, checkPhone: phoneCheck });
