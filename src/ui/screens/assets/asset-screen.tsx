/** An asset: one verdict pooled from its spots, what is covered, where to tap next. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Asset, Spot } from '../../../app/places.ts';
import type { NextStep } from '../../../core/model/asset-verdict.ts';
import { coverageSentence, nextStepSentence, scatterWords } from '../../../text/assets.ts';
import { INDICATIVE_LINE } from '../../../text/indicative.ts';
import { formatDamping, formatFrequency } from '../../../text/quantity.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { forcingName } from '../../../text/sources.ts';
import { verdictText, verdictWord } from '../../../text/verdicts.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { IconAdd } from '../../components/icons.tsx';
import { IndicativeLine } from '../../components/indicative-line.tsx';
import { Page } from '../../components/page.tsx';
import { VerdictMark } from '../../components/verdict-mark.tsx';
import { useLive } from '../../use-live.ts';
import { useLoaded } from '../../use-loaded.ts';
import { LostScreen } from '../lost-screen.tsx';
import { SourceRows } from '../sources/sources-screen.tsx';
import { AddPlaceDialog } from './add-place-dialog.tsx';
import { EditPlaceDialog } from './edit-place-dialog.tsx';
import { loadAsset, type LoadedAsset } from './load-asset.ts';
import { SpotRows } from './place-rows.tsx';

const text = officeText.places;

export function AssetScreen({ app, id }: { readonly app: App; readonly id: string }) {
  const loaded = useLoaded(
    app.store,
    async () => {
      const tree = await app.places.tree();
      const all = [...tree.sites.flatMap((site) => site.assets), ...tree.looseAssets];
      const asset = all.find((entry) => entry.id === id);
      const site = tree.sites.find((entry) => entry.id === asset?.site);
      return asset ? { asset, site, ...(await loadAsset(app, asset)) } : { asset: undefined };
    },
    [id],
  );
  const [open, setOpen] = useState<'add' | 'edit'>();
  if (!loaded) return null;
  if (!loaded.asset) return <LostScreen app={app} />;
  const { asset, site, verdict, sources } = loaded;
  const { coverage } = verdict;
  const back = () => app.navigation.back({ screen: 'assets' });
  return (
    <Page
      over={site?.name ?? text.kinds.asset.name}
      title={asset.name || screenText.common.unnamed}
      back={{ label: screenText.common.back, onClick: back }}
      aside={
        <Button kind="quiet" onClick={() => setOpen('edit')}>
          {screenText.common.edit}
        </Button>
      }
    >
      <Pooled app={app} asset={asset} loaded={loaded} />
      {loaded.hasPractice && <p class="note">{text.holdsPractice}</p>}
      <section class="stack">
        <h2>{text.spots}</h2>
        <p class="note">
          {text.covered(coverage.spotsRead.length, asset.spots.length, coverage.tapCount)}{' '}
          {loaded.readings.length > 0 && coverageSentence(coverage)}
        </p>
        {asset.spots.length > 0 && <SpotRows app={app} spots={asset.spots} label={text.spots} />}
      </section>
      {verdict.next.length > 0 && (
        <section class="stack">
          <h2>{text.nextTitle}</h2>
          <ul class="stack stack-tight">
            {verdict.next.map((step, index) => (
              <li key={index}>
                <Next app={app} step={step} spots={asset.spots} />
              </li>
            ))}
          </ul>
        </section>
      )}
      <section class="stack">
        <h2>{text.assetSources}</h2>
        {sources.length > 0 ? (
          <SourceRows app={app} sources={sources} />
        ) : (
          <p class="quiet">{text.noSources}</p>
        )}
      </section>
      <IndicativeLine text={INDICATIVE_LINE} />
      <BottomBar>
        <Button kind="main" onClick={() => setOpen('add')}>
          <IconAdd />
          {text.addKind.spot}
        </Button>
      </BottomBar>
      {open === 'add' && (
        <AddPlaceDialog
          app={app}
          under={{ asset: id }}
          onClose={() => setOpen(undefined)}
          onAdded={(route) => app.navigation.go(route)}
        />
      )}
      {open === 'edit' && (
        <EditPlaceDialog
          app={app}
          entity={asset.entity}
          onClose={() => setOpen(undefined)}
          onTrashed={back}
        />
      )}
    </Page>
  );
}

function Pooled(props: { readonly app: App; readonly asset: Asset; readonly loaded: LoadedAsset }) {
  const { app, asset, loaded } = props;
  const { frequencyUnit } = useLive(app.settings);
  const { pairs, modes } = loaded.verdict;
  const worst = pairs[0];
  const reading = loaded.readings.find((entry) => entry.id === worst?.reading);
  const spot = asset.spots.find((entry) => entry.id === reading?.spot);
  return (
    <section class="stack">
      {worst?.separation && worst.reading ? (
        <div class="stack stack-tight">
          <p>
            <VerdictMark
              verdict={worst.separation.verdict}
              word={capital(verdictWord(worst.separation.verdict))}
            />{' '}
            {text.pair(
              forcingName(worst.forcing),
              formatFrequency(worst.separation.modeHz, undefined, frequencyUnit),
            )}{' '}
            <a href={app.navigation.href({ screen: 'reading', id: worst.reading })}>
              {spot?.name || screenText.common.unnamed}
            </a>
          </p>
          <p class="note">{verdictText(worst.separation.verdict).meaning}</p>
        </div>
      ) : (
        <p class="quiet">{text.noVerdict}</p>
      )}
      {modes.length > 0 && (
        <ul class="stack stack-tight" aria-label={text.modesFound}>
          {modes.map((mode, index) => (
            <li key={index}>
              <strong>{formatFrequency(mode.frequencyHz, mode.frequencySdHz, frequencyUnit)}</strong>{' '}
              <span class="note">
                {formatDamping(mode.dampingRatio, mode.dampingRatioSd)} ·{' '}
                {[text.inReadings(mode.readings.length), scatterWords(mode)].filter(Boolean).join('; ')}
              </span>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

function Next(props: { readonly app: App; readonly step: NextStep; readonly spots: readonly Spot[] }) {
  const { app, step } = props;
  const spot = props.spots.find((entry) => entry.id === step.spot);
  const sentence = nextStepSentence(step, spot?.name);
  return step.spot ? (
    <a href={app.navigation.href({ screen: 'take', spot: step.spot })}>{sentence}</a>
  ) : (
    <>{sentence}</>
  );
}

const capital = (word: string) => word.charAt(0).toUpperCase() + word.slice(1);
