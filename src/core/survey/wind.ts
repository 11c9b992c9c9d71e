import type { Interval } from '../model/interval.ts';
import type { WindSource } from '../model/source.ts';

/** Density of air, kg/m³ (EN 1991-1-4 4.5, recommended value). */
export const AIR_DENSITY_KGPM3 = 1.25;

/** Strouhal number of a circular cylinder: 0.18 in EN 1991-1-4 Table E.1, about 0.21 in sub-critical flow elsewhere. */
export const STROUHAL_CIRCLE: Interval = [0.18, 0.21];

/** Rectangle by depth/width, EN 1991-1-4 Fig. E.1 from memory (.7, doubtful): shown with "check against the standard". */
export const STROUHAL_RECTANGLE: readonly (readonly [depthOverWidth: number, strouhal: number])[] = [
  [1, 0.12],
  [2, 0.06],
  [3, 0.06],
  [3.5, 0.15],
  [5, 0.11],
  [10, 0.09],
];

/** Strouhal number of a rectangle, linear between the points of the table, held outside. */
export function rectangleStrouhal(depthOverWidth: number): number {
  const points = STROUHAL_RECTANGLE;
  for (let index = 1; index < points.length; index++) {
    const [x0, y0] = points[index - 1] as readonly [number, number];
    const [x1, y1] = points[index] as readonly [number, number];
    if (depthOverWidth <= x1) return y0 + (Math.max(0, depthOverWidth - x0) / (x1 - x0)) * (y1 - y0);
  }
  return (points.at(-1) as readonly [number, number])[1];
}

export interface Strouhal {
  readonly range: Interval;
  readonly origin: string;
  readonly certain: boolean;
}

/** Strouhal number of a wind source, with where it comes from. */
export function strouhalOf(source: WindSource): Strouhal {
  if (source.strouhalRatio !== undefined)
    return { range: [source.strouhalRatio, source.strouhalRatio], origin: 'as entered', certain: true };
  if (source.shape === 'square' || source.shape === 'rectangle') {
    const depthOverWidth = source.shape === 'square' ? 1 : (source.depthM ?? source.widthM) / source.widthM;
    const value = rectangleStrouhal(depthOverWidth);
    return { range: [value, value], origin: 'EN 1991-1-4 Fig. E.1', certain: false };
  }
  return { range: STROUHAL_CIRCLE, origin: 'EN 1991-1-4 Table E.1', certain: true };
}

/** Wind speed at which vortices shed at a natural frequency: v = b n / St (EN 1991-1-4 E.1.3.1). */
export function criticalWindSpeedMps(widthM: number, frequencyHz: number, strouhal: number): number {
  return (widthM * frequencyHz) / strouhal;
}

/**
 * Scruton number Sc = 2 m delta / (rho b²) (EN 1991-1-4 E.1.3.3), delta being the structural log decrement.
 * @param massPerLengthKgPerM equivalent mass per unit length
 */
export function scrutonNumber(massPerLengthKgPerM: number, logDecrement: number, widthM: number): number {
  return (2 * massPerLengthKgPerM * logDecrement) / (AIR_DENSITY_KGPM3 * widthM ** 2);
}
