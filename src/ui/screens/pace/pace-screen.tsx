/** A pace that a walker follows by eye, to test a floor or bridge at its frequency divided by a harmonic. No sound, no vibration. */
import { useEffect, useRef, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { formatNumber } from '../../../text/number.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { Choice } from '../../components/choice.tsx';
import { NumberField } from '../../components/field.tsx';
import { Page } from '../../components/page.tsx';
import { parseNumber } from '../../parse-number.ts';
import styles from './pace-screen.module.css';

const text = officeText.pace;

/** Slowest and fastest steady walk worth trying, steps a second (walking 1.6-2.4 Hz: ISO 10137:2007 A.1, from memory; some room beside). */
const WALKABLE_HZ = [1.2, 2.6] as const;
const HARMONICS = ['1', '2', '3', '4'] as const;

export function PaceScreen({ app, frequencyHz }: { readonly app: App; readonly frequencyHz?: number }) {
  const [typed, setTyped] = useState(frequencyHz ? formatNumber(frequencyHz, 3) : '2');
  const target = parseNumber(typed);
  const [harmonic, setHarmonic] = useState<(typeof HARMONICS)[number]>(
    frequencyHz ? bestHarmonic(frequencyHz) : '1',
  );
  const [isRunning, setIsRunning] = useState(false);
  const paceHz = target ? target / Number(harmonic) : undefined;
  const isWalkable = paceHz !== undefined && paceHz >= WALKABLE_HZ[0] && paceHz <= WALKABLE_HZ[1];
  return (
    <Page
      title={text.title}
      back={{ label: screenText.common.back, onClick: () => app.navigation.back({ screen: 'start' }) }}
    >
      <Steps paceHz={isRunning && isWalkable ? paceHz : undefined} />
      <p class={styles.pace} aria-live="polite">
        {paceHz ? text.perMinute(Math.round(paceHz * 60), formatNumber(paceHz, 3)) : text.noFrequency}
      </p>
      {paceHz !== undefined && !isWalkable && <p class="quiet">{text.notWalkable}</p>}
      <NumberField label={text.frequency} unit="Hz" value={typed} onInput={setTyped} />
      <Choice
        legend={text.harmonic}
        name="harmonic"
        value={harmonic}
        options={HARMONICS.map((value) => ({ value, label: text.harmonics[value] }))}
        onChange={setHarmonic}
      />
      <p class="note">{text.note}</p>
      <BottomBar>
        <Button kind="main" disabled={!isWalkable} onClick={() => setIsRunning(!isRunning)}>
          {isRunning ? text.stop : text.start}
        </Button>
      </BottomBar>
    </Page>
  );
}

/** The harmonic that puts the pace nearest to an ordinary walk. */
function bestHarmonic(frequencyHz: number): (typeof HARMONICS)[number] {
  const middleHz = (WALKABLE_HZ[0] + WALKABLE_HZ[1]) / 2;
  const distance = (harmonic: string) => Math.abs(Math.log(frequencyHz / Number(harmonic) / middleHz));
  return [...HARMONICS].sort((a, b) => distance(a) - distance(b))[0] ?? '1';
}

/** Left, right, left: the half that is full is the foot to set down. Timed by the clock, so it does not drift; nothing slides. */
function Steps({ paceHz }: { readonly paceHz: number | undefined }) {
  const left = useRef<HTMLDivElement>(null);
  const right = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (paceHz === undefined) return undefined;
    const startMs = performance.now();
    let frame = 0;
    const beat = (nowMs: number) => {
      const step = Math.floor(((nowMs - startMs) / 1000) * paceHz);
      left.current?.toggleAttribute('data-on', step % 2 === 0);
      right.current?.toggleAttribute('data-on', step % 2 !== 0);
      frame = requestAnimationFrame(beat);
    };
    frame = requestAnimationFrame(beat);
    return () => {
      cancelAnimationFrame(frame);
      left.current?.removeAttribute('data-on');
      right.current?.removeAttribute('data-on');
    };
  }, [paceHz]);
  return (
    <div class={styles.steps} aria-hidden="true">
      <div ref={left} class={styles.foot}>
        {text.left}
      </div>
      <div ref={right} class={styles.foot}>
        {text.right}
      </div>
    </div>
  );
}
