/** Two readings side by side: what changed beyond the uncertainties, and which circumstances differ. */
import type { App } from '../../../app/app.ts';
import type { OpenedReading } from '../../../app/ports.ts';
import { currentAnalysis, currentPlaceIds } from '../../../app/readings.ts';
import { levelRatio, visitChange, type Visit } from '../../../app/survey-desk.ts';
import type { Circumstances } from '../../../core/model/fact.ts';
import { changeSentence, conditionName } from '../../../text/assets.ts';
import { INDICATIVE_LINE } from '../../../text/indicative.ts';
import { formatNumber } from '../../../text/number.ts';
import { formatDamping, formatFrequency, formatVelocity } from '../../../text/quantity.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { IndicativeLine } from '../../components/indicative-line.tsx';
import { Page } from '../../components/page.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { LostScreen } from '../lost-screen.tsx';
import styles from './compare-screen.module.css';

const text = officeText.compare;

export function CompareScreen(props: { readonly app: App; readonly first: string; readonly second: string }) {
  const { app } = props;
  const loaded = useLoaded(
    app.store,
    async () => {
      const pair = [await app.readings.open(props.first), await app.readings.open(props.second)] as const;
      return { pair, history: await historyOf(app, pair[0]) };
    },
    [props.first, props.second],
  );
  if (!loaded) return null;
  const [before, after] = loaded.pair;
  if (!before || !after) return <LostScreen app={app} />;
  return (
    <Page
      title={text.title}
      back={{ label: screenText.common.back, onClick: () => app.navigation.back({ screen: 'readings' }) }}
    >
      <Sentences before={before} after={after} history={loaded.history} />
      <ComparisonTable app={app} before={before} after={after} history={loaded.history} />
      <Differences before={before} after={after} history={loaded.history} />
      <IndicativeLine text={INDICATIVE_LINE} />
    </Page>
  );
}

interface Pair {
  readonly before: OpenedReading;
  readonly after: OpenedReading;
  /** Visits to the same spot: from five on their own scatter decides what counts as a change. */
  readonly history: readonly Visit[];
}

const toVisit = (opened: OpenedReading): Visit => ({
  id: opened.reading._id,
  recordedAt: opened.reading.recordedAt,
  analysis: currentAnalysis(opened),
  circumstances: opened.reading.circumstances,
});

async function historyOf(app: App, opened: OpenedReading | undefined): Promise<readonly Visit[]> {
  const { spot } = opened ? currentPlaceIds(opened) : {};
  if (!spot) return [];
  const visits = await app.places.visits(spot);
  const all = await Promise.all(visits.map((visit) => app.readings.open(visit.id)));
  return all.filter((entry): entry is OpenedReading => entry !== undefined).map(toVisit);
}

/** Modes in the order of their strength in the earlier reading. */
const changeOf = ({ before, after, history }: Pair) => {
  const change = visitChange(toVisit(before), toVisit(after), history);
  return { ...change, modes: [...change.modes].sort((a, b) => a.earlierIndex - b.earlierIndex) };
};

function Sentences(pair: Pair) {
  const strongest = changeOf(pair).modes[0];
  if (!strongest) return <p>{text.noPair}</p>;
  return (
    <div class="stack stack-tight">
      <p>{changeSentence(text.frequency, strongest.frequency)}</p>
      <p>{changeSentence(text.damping, strongest.damping)}</p>
      <p class="note">{text.notTheSame}</p>
    </div>
  );
}

function ComparisonTable(props: Pair & { readonly app: App }) {
  const { app, before, after } = props;
  const { frequencyUnit, velocityUnit } = useLive(app.settings);
  const earlier = currentAnalysis(before);
  const later = currentAnalysis(after);
  const changes = changeOf(props).modes;
  const level = (reading: typeof earlier) =>
    reading.levels?.velocityRmsMps === undefined
      ? '–'
      : formatVelocity(reading.levels.velocityRmsMps, undefined, velocityUnit);
  const rows = [
    ...changes.flatMap((change, index) => {
      const first = earlier.modes[change.earlierIndex];
      const second = later.modes[change.laterIndex];
      if (!first || !second) return [];
      return [
        {
          name: `${text.mode} ${index + 1}`,
          first: formatFrequency(first.frequencyHz, first.frequencySdHz, frequencyUnit),
          second: formatFrequency(second.frequencyHz, second.frequencySdHz, frequencyUnit),
          change: signedPercent(change.frequency.ratio),
        },
        {
          name: text.damping,
          first: formatDamping(first.dampingRatio, first.dampingRatioSd),
          second: formatDamping(second.dampingRatio, second.dampingRatioSd),
          change: signedPercent(change.damping.ratio),
        },
      ];
    }),
    {
      name: text.level,
      first: level(earlier),
      second: level(later),
      change: signedPercent(levelRatio(earlier, later)),
    },
    { name: text.trust, first: earlier.trust, second: later.trust, change: '' },
  ];
  const head = (opened: OpenedReading) => (
    <a href={app.navigation.href({ screen: 'reading', id: opened.reading._id })}>
      {dayAndTime(opened.reading.recordedAt)}
      {opened.reading.practice ? ` (${screenText.common.practice})` : ''}
    </a>
  );
  return (
    <div class={styles.scroll} tabIndex={0} role="region" aria-label={text.title}>
      <table class={styles.table}>
        <thead>
          <tr>
            <td />
            <th scope="col">{head(before)}</th>
            <th scope="col">{head(after)}</th>
            <th scope="col">{text.change}</th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row, index) => (
            <tr key={index}>
              <th scope="row">{row.name}</th>
              <td>{unitsTogether(row.first)}</td>
              <td>{unitsTogether(row.second)}</td>
              <td>{unitsTogether(row.change)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

/** In a narrow cell the value with its unit stands on one line, ± with its figure on the next. */
const unitsTogether = (text: string): string =>
  text.replace('± ', '±\u00a0').replaceAll(/(\d) (?=[^\s±])/g, '$1\u00a0');

const signedPercent = (ratio: number | undefined): string =>
  ratio === undefined ? '–' : `${ratio < 1 ? '−' : '+'}${formatNumber(Math.abs(100 * (ratio - 1)), 2)} %`;

function Differences(pair: Pair) {
  const { before, after } = pair;
  const { conditions } = changeOf(pair);
  const differ = before.reading.procedure !== after.reading.procedure;
  const temperature = temperatureText(before.reading.circumstances, after.reading.circumstances);
  if (conditions.length === 0 && !differ)
    return (
      <p class="note">
        {text.sameCircumstances} {temperature}
      </p>
    );
  return (
    <section class="stack stack-tight">
      <h2>{text.differs}</h2>
      {!conditions.includes('temperatureC') && <p class="note">{temperature}</p>}
      <ul>
        {differ && <li>{text.differentProcedure}</li>}
        {conditions.map((key) => (
          <li key={key}>
            {capital(conditionName(key))}: {shown(key, before.reading.circumstances)} →{' '}
            {shown(key, after.reading.circumstances)}
          </li>
        ))}
      </ul>
    </section>
  );
}

/** The temperature stands beside every comparison, noted or not: it moves frequencies by itself. */
function temperatureText(before: Circumstances, after: Circumstances): string {
  const [first, second] = [before.temperatureC, after.temperatureC];
  return first === undefined || second === undefined
    ? text.noTemperature
    : text.temperatures(formatNumber(first, 2), formatNumber(second, 2));
}

const capital = (words: string) => words.charAt(0).toUpperCase() + words.slice(1);

function shown(key: keyof Circumstances, circumstances: Circumstances): string {
  const value = circumstances[key];
  const words = (screenText.take as unknown as Record<string, Record<string, string> | undefined>)[key];
  return value === undefined ? screenText.common.notGiven : (words?.[String(value)] ?? String(value));
}
