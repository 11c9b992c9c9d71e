/** Procedure `auto`: which of the four a record is. */
export { recogniseProcedure } from './recognise/recognise-procedure.ts';
