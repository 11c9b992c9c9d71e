import type { Interval } from '../../core/model/interval.ts';

/** Custom property that holds a colour, so that themes reach the canvas. */
export type ColourToken = `--${string}`;

export interface PlotSeries {
  readonly label: string;
  /** One a place of x; NaN where this line has no value: the line then runs on to its next one. */
  readonly values: ArrayLike<number>;
  readonly colour: ColourToken;
  /** `dots` for what was measured, `line` for what joins up, `dashes` for what was computed. */
  readonly kind: 'line' | 'dots' | 'dashes' | 'dotted';
}

export interface PlotMark {
  readonly at: number;
  readonly label: string;
  readonly colour: ColourToken;
  readonly isDashed?: boolean;
}

export interface PlotSpec {
  readonly x: ArrayLike<number>;
  readonly xLabel: string;
  readonly wholeX: Interval;
  readonly yLabel: string;
  readonly isLogY?: boolean;
  /** Smallest value drawn on a logarithmic y axis. */
  readonly floorY?: number;
  /** Fixed y range; follows the visible data where absent. */
  readonly rangeY?: Interval;
  readonly series: readonly PlotSeries[];
  readonly marks: readonly PlotMark[];
  /** Parts of the x axis that the recording could not see. */
  readonly shades: readonly Interval[];
}
