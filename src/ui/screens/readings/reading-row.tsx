import type { App } from '../../../app/app.ts';
import type { ReadingSummary } from '../../../app/ports.ts';
import { formatDamping, formatFrequency } from '../../../text/quantity.ts';
import { screenText } from '../../../text/screens.ts';
import { Row } from '../../components/rows.tsx';
import { useLive } from '../../use-live.ts';
import { readingName, type PlaceNames } from './place-names.ts';
import { dayAndTime } from '../../day-and-time.ts';

/** One reading in a list: where, what it rings at, when; practice is said in words. */
export function ReadingRow(props: {
  readonly app: App;
  readonly reading: ReadingSummary;
  readonly names: PlaceNames;
  readonly isCurrent?: boolean;
  readonly select?: { readonly checked: boolean; readonly onChange: (on: boolean) => void };
}) {
  const { app, reading } = props;
  const { frequencyUnit } = useLive(app.settings);
  const name = readingName(reading, props.names);
  const note = [
    dayAndTime(reading.recordedAt),
    screenText.procedures[reading.procedure].verb,
    ...(reading.practice ? [screenText.common.practice] : []),
  ].join(' · ');
  return (
    <Row
      href={app.navigation.href({ screen: 'reading', id: reading.id })}
      title={name}
      note={note}
      {...(props.isCurrent ? { isCurrent: true } : {})}
      figure={
        reading.frequencyHz === undefined ? (
          <span class="note">{screenText.readings.noFrequency}</span>
        ) : (
          <>
            <strong class="one-line">
              {formatFrequency(reading.frequencyHz, reading.frequencySdHz, frequencyUnit)}
            </strong>
            {reading.dampingRatio !== undefined && (
              <span class="one-line quiet">
                {' '}
                {formatDamping(reading.dampingRatio, reading.dampingRatioSd)}
              </span>
            )}
          </>
        )
      }
      {...(props.select ? { select: { ...props.select, label: screenText.readings.selectOne(name) } } : {})}
    />
  );
}
