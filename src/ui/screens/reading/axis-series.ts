import type { AxisName } from '../../../core/model/recording.ts';
import { readingText } from '../../../text/reading-screen.ts';
import type { PlotSeries } from '../../charts/plot-spec.ts';

const LOOK: Readonly<Record<AxisName, Pick<PlotSeries, 'colour' | 'kind'>>> = {
  x: { colour: '--chart-x', kind: 'line' },
  y: { colour: '--chart-y', kind: 'dashes' },
  z: { colour: '--chart-z', kind: 'dotted' },
};

/** One line a sensor axis, told apart by colour and stroke. */
export const axisSeries = (
  axes: readonly AxisName[],
  values: readonly ArrayLike<number>[],
  scale: number,
  /** Strokes tell sparse lines apart; in a dense trace they only blur. */
  isDense = false,
): PlotSeries[] =>
  axes.flatMap((name, index) => {
    const own = values[index];
    if (!own) return [];
    const scaled = scale === 1 ? own : Float64Array.from(own, (value) => value * scale);
    return [
      {
        label: readingText.plots.axis(name),
        values: scaled,
        ...LOOK[name],
        ...(isDense ? { kind: 'line' } : {}),
      },
    ];
  });
