/** Procedure `auto`: which of the four a record is, and whether the one asked for fits. */
export { isAtRest, otherProcedure, recogniseProcedure } from './recognise/recognise-procedure.ts';
