/** Before the sensor is on: what it is, where to lay the phone, how to excite it. Everything has a default. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { unseenCautions, withSeen } from '../../../app/cautions.ts';
import type { Whereabouts } from '../../../app/places.ts';
import { replan, type TakePlan } from '../../../app/take-plan.ts';
import { PROCEDURES } from '../../../core/model/analysis.ts';
import { SPOT_KINDS, type SpotKind } from '../../../core/model/place.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { Choice } from '../../components/choice.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { Page } from '../../components/page.tsx';
import { PlacementDrawing } from '../../components/placement-drawing.tsx';
import { Later } from '../../later.tsx';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { CautionDialog } from './caution-dialog.tsx';
import { CircumstancesForm } from './circumstances-form.tsx';
import styles from './prepare-step.module.css';

const text = screenText.take;

/** Samples a second that browsers give when they are asked for the most, before this phone was checked. */
const USUAL_RATE_HZ = 60;

export function PrepareStep({ app, onLeave }: { readonly app: App; readonly onLeave: () => void }) {
  const plan = useLive(app.take.plan);
  const settings = useLive(app.settings);
  const [open, setOpen] = useState<'spot' | 'kind' | 'procedure' | 'circumstances' | 'cautions'>();
  const close = () => setOpen(undefined);
  const change = (next: TakePlan) => app.take.plan.set(next);
  const cautions = unseenCautions(plan, settings.cautionsSeen, app.today());
  const isKindKnown = plan.where.place !== undefined || settings.lastSpotKind !== null;
  const chooseKind = (spotKind: SpotKind) => {
    app.settings.change({ lastSpotKind: spotKind });
    change(replan(plan, { spotKind }));
    close();
  };
  const beginWords = plan.practice ? text.beginPractice : text.begin;
  const begin = () => {
    if (cautions.length > 0) setOpen('cautions');
    else app.take.begin();
  };
  if (!isKindKnown) return <KindStep onChoose={chooseKind} onLeave={onLeave} />;
  return (
    <Page title={text.howToPlace[plan.spotKind]} back={{ label: text.leave, onClick: onLeave }}>
      <PlacementDrawing kind={plan.spotKind} />
      {plan.procedure === 'tap' && <p class="quiet">{text.tapHow[plan.spotKind]}</p>}
      {plan.procedure !== 'tap' && <p class="quiet">{text.settledNote[plan.procedure]}</p>}
      {plan.procedure !== 'tap' && <FoldedNote app={app} where={plan.where} />}
      <ul class={styles.settings}>
        <Setting name={text.spot} value={whereText(plan)} onClick={() => setOpen('spot')} />
        <Setting
          name={text.procedureLegend}
          value={screenText.procedures[plan.procedure].name}
          onClick={() => setOpen('procedure')}
        />
        <Setting
          name={text.spotLegend}
          value={screenText.spotKinds[plan.spotKind]}
          onClick={() => setOpen('kind')}
        />
        <Setting
          name={text.circumstances}
          value={`${text.mounting[plan.circumstances.mounting]}, ${plan.durationS} s`}
          onClick={() => setOpen('circumstances')}
        />
      </ul>
      <BottomBar>
        <Button kind="main" onClick={begin}>
          {beginWords}
        </Button>
      </BottomBar>
      {open === 'spot' && (
        <Later load={() => import('../assets/pick-spot-dialog.tsx')}>
          {({ PickSpotDialog }) => (
            <PickSpotDialog
              app={app}
              kind={plan.spotKind}
              onClose={close}
              onPick={(where) => {
                close();
                void app.take.placeAt(where);
              }}
            />
          )}
        </Later>
      )}
      {open === 'procedure' && (
        <Dialog
          title={text.procedureLegend}
          onClose={close}
          actions={<Button onClick={close}>{screenText.common.done}</Button>}
        >
          <Choice
            legend={text.procedureLegend}
            hideLegend
            name="procedure"
            value={plan.procedure}
            options={PROCEDURES.map((value) => ({
              value,
              label: screenText.procedures[value].name,
              note: screenText.procedures[value].note,
            }))}
            onChange={(procedure) => change(replan(plan, { procedure }))}
          />
        </Dialog>
      )}
      {open === 'kind' && (
        <Dialog
          title={text.whatKind}
          onClose={close}
          actions={<Button onClick={close}>{screenText.common.close}</Button>}
        >
          <KindTiles current={plan.spotKind} onChoose={chooseKind} />
        </Dialog>
      )}
      {open === 'circumstances' && (
        <Dialog
          title={text.circumstances}
          onClose={close}
          actions={
            <Button kind="main" onClick={close}>
              {screenText.common.done}
            </Button>
          }
        >
          <CircumstancesForm plan={plan} onChange={change} />
        </Dialog>
      )}
      {open === 'cautions' && (
        <CautionDialog
          cautions={cautions}
          confirm={beginWords}
          onClose={close}
          onConfirm={() => {
            app.settings.change({ cautionsSeen: withSeen(settings.cautionsSeen, cautions, app.today()) });
            close();
            app.take.begin();
          }}
        />
      )}
    </Page>
  );
}

/** What this phone cannot tell apart at this spot, known before anything is recorded. */
function FoldedNote({ app, where }: { readonly app: App; readonly where: Whereabouts }) {
  const folded = useLoaded(
    app.store,
    async () => {
      const check = await app.phone.lastCheck();
      const found = await app.sources.foldedAt(where, check?.rateHz ?? USUAL_RATE_HZ);
      const { foldedForcingSentence } = await import('../../../text/sources.ts');
      return found.map(foldedForcingSentence);
    },
    [where],
  );
  if (!folded || folded.length === 0) return null;
  return (
    <details>
      <summary>{text.folded(folded.length)}</summary>
      <ul class="stack stack-tight">
        {folded.map((sentence) => (
          <li key={sentence} class="note">
            {sentence}
          </li>
        ))}
      </ul>
    </details>
  );
}

function KindStep(props: { readonly onChoose: (kind: SpotKind) => void; readonly onLeave: () => void }) {
  return (
    <Page title={text.whatKind} back={{ label: text.leave, onClick: props.onLeave }}>
      <KindTiles onChoose={props.onChoose} />
    </Page>
  );
}

function KindTiles(props: { readonly current?: SpotKind; readonly onChoose: (kind: SpotKind) => void }) {
  return (
    <ul class={styles.tiles}>
      {SPOT_KINDS.map((kind) => (
        <li key={kind}>
          <button
            type="button"
            class={styles.tile}
            aria-pressed={kind === props.current}
            onClick={() => props.onChoose(kind)}
          >
            <PlacementDrawing kind={kind} small />
            <span>{screenText.spotKinds[kind]}</span>
          </button>
        </li>
      ))}
    </ul>
  );
}

function Setting(props: { readonly name: string; readonly value: string; readonly onClick: () => void }) {
  return (
    <li>
      <button type="button" class={styles.setting} onClick={props.onClick}>
        <span class="quiet">{props.name}</span>
        <span class={styles.value}>{props.value}</span>
      </button>
    </li>
  );
}

function whereText(plan: TakePlan): string {
  const { site, asset, spot } = plan.where.names;
  return [site, asset, spot].filter(Boolean).join(' · ') || text.spotNone;
}
