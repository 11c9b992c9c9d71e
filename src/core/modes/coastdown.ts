/** Coast-down procedure: what the chain takes from `coastdown/`. */
export { coastdownProcedure } from './coastdown/coastdown-procedure.ts';
