/** Which fields each kind of source has, as data: what to type, in which unit, and how it becomes SI. */
import type { SourceKind } from '../../../core/model/source.ts';

export type SourceField =
  | {
      readonly type: 'measure';
      readonly key: string;
      readonly unit?: string;
      /** Value kept per unit typed, e.g. 0.001 for mm to m. */
      readonly perUnit?: number;
      /** A range "900-1500" may be typed. */
      readonly isRange?: boolean;
      readonly isNeeded?: boolean;
    }
  | { readonly type: 'list'; readonly key: string }
  | {
      readonly type: 'choice';
      readonly key: string;
      readonly values: readonly string[];
      readonly isNumber?: boolean;
    }
  | { readonly type: 'check'; readonly key: string };

export const SOURCE_FIELDS: Readonly<Record<SourceKind, readonly SourceField[]>> = {
  machine: [
    { type: 'measure', key: 'speedRpm', unit: 'r/min', isRange: true, isNeeded: true },
    { type: 'check', key: 'variableSpeed' },
    { type: 'measure', key: 'bladeCount' },
    { type: 'list', key: 'orders' },
    { type: 'measure', key: 'toothCount' },
    { type: 'measure', key: 'cylinders' },
    { type: 'check', key: 'twoStroke' },
  ],
  belt: [
    { type: 'measure', key: 'speedRpm', unit: 'r/min', isRange: true, isNeeded: true },
    { type: 'measure', key: 'pulleyDiameterM', unit: 'mm', perUnit: 0.001, isNeeded: true },
    { type: 'measure', key: 'beltLengthM', unit: 'mm', perUnit: 0.001, isNeeded: true },
  ],
  mains: [
    { type: 'choice', key: 'supplyHz', values: ['50', '60'], isNumber: true },
    { type: 'choice', key: 'poles', values: ['', '2', '4', '6', '8', '10', '12'], isNumber: true },
    { type: 'measure', key: 'speedRpm', unit: 'r/min', isRange: true },
  ],
  footfall: [
    {
      type: 'choice',
      key: 'activity',
      values: ['walking', 'running', 'stairs', 'jumping', 'dancing', 'sway'],
    },
    { type: 'measure', key: 'paceHz', unit: 'steps/s', isRange: true },
    { type: 'measure', key: 'peopleCount' },
    { type: 'measure', key: 'stepCount' },
  ],
  wind: [
    { type: 'measure', key: 'widthM', unit: 'mm', perUnit: 0.001, isNeeded: true },
    { type: 'measure', key: 'speedMps', unit: 'm/s', isRange: true, isNeeded: true },
    { type: 'choice', key: 'shape', values: ['circle', 'square', 'rectangle', 'custom'] },
    { type: 'measure', key: 'depthM', unit: 'mm', perUnit: 0.001 },
    { type: 'measure', key: 'strouhalRatio' },
    { type: 'measure', key: 'massPerLengthKgPerM', unit: 'kg/m' },
  ],
  traffic: [{ type: 'choice', key: 'traffic', values: ['road', 'rail'] }],
  band: [
    { type: 'measure', key: 'frequencyHz', unit: 'Hz', isRange: true, isNeeded: true },
    { type: 'measure', key: 'harmonics' },
    { type: 'choice', key: 'through', values: ['force', 'base', 'unbalance'] },
  ],
};

/** Kinds whose speed or frequency was read somewhere, so that how it was known matters. */
export const HAS_KNOWN_BY: readonly SourceKind[] = ['machine', 'belt', 'mains', 'band'];

/** What the forcings cannot do without, asked first; the rest waits until someone opens it. */
export const isFirst = (field: SourceField): boolean =>
  (field.type === 'measure' && field.isNeeded === true) ||
  (field.type === 'choice' && field.values[0] !== '') ||
  field.key === 'variableSpeed' ||
  field.key === 'bladeCount' ||
  field.key === 'paceHz';
