/** Guided pairs at one spot: with and without a known mass, before and after a repair, a row of machine speeds. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { OpenedReading, ReadingSummary } from '../../../app/ports.ts';
import { currentAnalysis } from '../../../app/readings.ts';
import { addedMassTest, massShiftRatio, modePairs, speedSeries } from '../../../app/survey-desk.ts';
import type { ModalValues } from '../../../core/model/guided-pairs.ts';
import { problemSentence } from '../../../text/problems.ts';
import { speedSeriesSentence } from '../../../text/assets.ts';
import { INDICATIVE_LINE } from '../../../text/indicative.ts';
import { withUncertainty } from '../../../text/number.ts';
import { formatAcceleration, formatFrequency, formatPercent } from '../../../text/quantity.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Button, LinkButton } from '../../components/button.tsx';
import { Choice } from '../../components/choice.tsx';
import { NumberField, SelectField } from '../../components/field.tsx';
import { IndicativeLine } from '../../components/indicative-line.tsx';
import { Page } from '../../components/page.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { parseNumber } from '../../parse-number.ts';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import styles from './compare-screen.module.css';

const text = officeText.series;

export function SeriesScreen({ app, id }: { readonly app: App; readonly id: string }) {
  const visits = useLoaded(app.store, () => app.places.visits(id), [id]);
  const [kind, setKind] = useState<'mass' | 'repair' | 'speed'>('mass');
  if (!visits) return null;
  return (
    <Page
      title={text.title}
      back={{ label: screenText.common.back, onClick: () => app.navigation.back({ screen: 'spot', id }) }}
    >
      <Choice
        legend={text.which}
        name="series"
        value={kind}
        options={(['mass', 'repair', 'speed'] as const).map((value) => ({ value, label: text.kinds[value] }))}
        onChange={setKind}
      />
      <ol class={styles.steps}>
        {text.steps[kind].map((step) => (
          <li key={step}>{step}</li>
        ))}
      </ol>
      <div class="row">
        <LinkButton
          href={app.navigation.href({
            screen: 'take',
            spot: id,
            procedure: kind === 'speed' ? 'running' : 'tap',
          })}
        >
          {officeText.places.takeHere}
        </LinkButton>
      </div>
      {kind === 'speed' ? (
        <SpeedSeries app={app} visits={visits} />
      ) : (
        <PairForm key={kind} app={app} visits={visits} kind={kind} spot={id} />
      )}
      <IndicativeLine text={INDICATIVE_LINE} />
    </Page>
  );
}

function PairForm(props: {
  readonly app: App;
  readonly visits: readonly ReadingSummary[];
  readonly kind: 'mass' | 'repair';
  readonly spot: string;
}) {
  const { app, kind } = props;
  // A repair may have been of what shakes it: then running readings are compared, by level.
  const visits =
    kind === 'mass' ? props.visits.filter((visit) => visit.dampingRatio !== undefined) : props.visits;
  const [first, setFirst] = useState(visits.at(-2)?.id ?? '');
  const [second, setSecond] = useState(visits.at(-1)?.id ?? '');
  const [mass, setMass] = useState('');
  const pair = useLoaded(
    app.store,
    async () => ({ a: await app.readings.open(first), b: await app.readings.open(second) }),
    [first, second],
  );
  if (visits.length < 2) return <p class="quiet">{text.needTwo[kind]}</p>;
  const options = visits.map((visit) => ({
    value: visit.id,
    label: visitLabel(visit),
  }));
  const answer = massAnswer(pair?.a, pair?.b, parseNumber(mass));
  return (
    <section class="stack">
      <SelectField label={text.firstOf[kind]} value={first} options={options} onChange={setFirst} />
      <SelectField label={text.secondOf[kind]} value={second} options={options} onChange={setSecond} />
      {kind === 'mass' ? (
        <>
          <NumberField label={text.mass} unit="kg" value={mass} onInput={setMass} />
          <p aria-live="polite">{typeof answer === 'string' ? answer : modalText(answer)}</p>
          {typeof answer !== 'string' && (
            <div class="row">
              <Button
                onClick={() => void app.readings.edit(props.spot, { modal: { ...answer } }, text.keptModal)}
              >
                {text.keepModal}
              </Button>
            </div>
          )}
        </>
      ) : (
        first !== second && (
          <LinkButton kind="main" href={app.navigation.href({ screen: 'compare', first, second })}>
            {screenText.readings.compare}
          </LinkButton>
        )
      )}
    </section>
  );
}

const visitLabel = (visit: ReadingSummary): string =>
  visit.frequencyHz === undefined
    ? dayAndTime(visit.recordedAt)
    : `${dayAndTime(visit.recordedAt)}: ${formatFrequency(visit.frequencyHz, visit.frequencySdHz)}`;

function massAnswer(
  without: OpenedReading | undefined,
  withMass: OpenedReading | undefined,
  massKg: number | undefined,
): string | ModalValues {
  if (!massKg || massKg <= 0 || !without || !withMass) return text.massMissing;
  const before = currentAnalysis(without).modes;
  const after = currentAnalysis(withMass).modes;
  const pair = modePairs(before, after).find(([index]) => index === 0);
  const mode = before[0];
  const moved = pair && after[pair[1]];
  if (!mode || !moved) return text.noSameMode;
  const answer = addedMassTest(mode, moved, massKg);
  return answer.ok ? answer.value : problemSentence(answer.problem);
}

/** Weight of a common phone, kg, for saying what it does by itself (common practice, no source). */
const PHONE_MASS_KG = 0.2;

function modalText({ massKg, massSdKg, stiffnessNPerM, stiffnessSdNPerM }: ModalValues): string {
  const found = text.massSentence(
    withUncertainty(massKg, massSdKg, 'kg'),
    withUncertainty(stiffnessNPerM / 1000, stiffnessSdNPerM / 1000, 'N/mm'),
  );
  // the modal mass holds the phone that lay there in both readings
  if (!(massKg > PHONE_MASS_KG)) return found;
  const shift = massShiftRatio(PHONE_MASS_KG, massKg - PHONE_MASS_KG);
  return `${found} ${text.phoneShift(`${PHONE_MASS_KG} kg`, formatPercent(-shift))}`;
}

function SpeedSeries({ app, visits }: { readonly app: App; readonly visits: readonly ReadingSummary[] }) {
  const { accelerationUnit } = useLive(app.settings);
  const rows = useLoaded(
    app.store,
    async () => {
      const running = visits.filter((visit) => visit.procedure === 'running');
      const opened = await Promise.all(running.map((visit) => app.readings.open(visit.id)));
      return opened
        .filter((entry): entry is OpenedReading => entry?.reading.circumstances.speedRpm !== undefined)
        .sort((a, b) => (a.reading.circumstances.speedRpm ?? 0) - (b.reading.circumstances.speedRpm ?? 0));
    },
    [visits],
  );
  if (!rows) return null;
  if (rows.length === 0) return <p class="quiet">{text.needSpeeds}</p>;
  const series = speedSeries(
    rows.map((entry) => ({
      speedRpm: entry.reading.circumstances.speedRpm ?? 0,
      analysis: currentAnalysis(entry),
    })),
  );
  return (
    <>
      <p>{series.ok ? speedSeriesSentence(series.value) : problemSentence(series.problem)}</p>
      <div class={styles.scroll} tabIndex={0} role="region" aria-label={text.kinds.speed}>
        <table class={styles.table}>
          <thead>
            <tr>
              <th scope="col">{text.speed}</th>
              <th scope="col">{text.strongest}</th>
              <th scope="col">{text.rms}</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((entry) => {
              const analysis = currentAnalysis(entry);
              const tone = analysis.tones[0];
              return (
                <tr key={entry.reading._id}>
                  <th scope="row">
                    <a href={app.navigation.href({ screen: 'reading', id: entry.reading._id })}>
                      {entry.reading.circumstances.speedRpm} r/min
                    </a>
                  </th>
                  <td>
                    {tone
                      ? `${formatFrequency(tone.frequencyHz)}: ${formatAcceleration(tone.amplitudeMps2, tone.amplitudeSdMps2, accelerationUnit)}`
                      : '–'}
                  </td>
                  <td>
                    {analysis.levels
                      ? formatAcceleration(analysis.levels.rmsMps2, undefined, accelerationUnit)
                      : '–'}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
    </>
  );
}
