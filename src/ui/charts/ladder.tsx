import { useMemo, useRef } from 'preact/hooks';
import { ladderRangeHz, type LadderContent } from '../../core/picture/ladder-content.ts';
import { ladderItemAt } from '../../core/picture/ladder-item-at.ts';
import { ladderPicture, type LadderPicture } from '../../core/picture/ladder-picture.ts';
import { ladderShapes } from '../../core/picture/ladder-shapes.ts';
import { useElementSize } from './element-size.ts';
import { keyActs } from './key-acts.ts';
import './ladder-drawing.css';
import styles from './ladder.module.css';
import { measureLike } from './measure-text.ts';
import { SvgShapes } from './svg-shapes.tsx';
import { useLadderZoom } from './use-ladder-zoom.ts';
import { ZoomTools, type ZoomWords } from './zoom-tools.tsx';

export interface LadderWords extends ZoomWords {
  readonly name: string;
  readonly keys: string;
  /** Said when there was no room for so many labels. */
  readonly hidden?: (count: number) => string;
}

export interface LadderProps {
  readonly content: LadderContent;
  /** What the picture shows, for those who do not see it. The table belongs below, by the screen. */
  readonly sentence: string;
  readonly words: LadderWords;
  /** 1 for Hz, 60 for r/min. */
  readonly shownPerHz?: number;
  readonly heightPx?: number;
  readonly selected?: ReadonlySet<string>;
  /** The item that arrow keys start from. */
  readonly current?: string | undefined;
  /** Without its zoom buttons, where room is short; wheel, pinch and keys still zoom. */
  readonly isCompact?: boolean;
  /** Called with the id of a mode, forcing or tone; undefined for none. Without it the ladder is a still picture. */
  readonly onPick?: (id: string | undefined) => void;
}

const NONE: ReadonlySet<string> = new Set();
const HEIGHT_PX = 440;
/** On a laptop there is room for finer steps. */
const WIDE_HEIGHT_PX = 520;
const WIDE_PX = 400;
/** Taller would leave the screen; then labels of the least rank go, and zooming brings them back. */
const TALLEST_PX = 680;

/** Height that gives larger text, and many labels, their room. */
const fittingHeightPx = (wantedPx: number, textPx: number, labelCount: number): number =>
  Math.min(TALLEST_PX, Math.max(wantedPx, textPx * 26, textPx * (1.33 * labelCount + 5)));

/** Items in order of frequency, for the arrow keys. */
const idsUpwards = (content: LadderContent): string[] =>
  [
    ...content.modes.map((m) => ({ id: m.id, hz: m.frequencyHz })),
    ...content.forcings.map((f) => ({ id: f.id, hz: Math.sqrt(f.frequencyHz[0] * f.frequencyHz[1]) })),
    ...content.tones.map((t) => ({ id: t.id, hz: t.frequencyHz })),
  ]
    .sort((a, b) => a.hz - b.hz)
    .map((item) => item.id);

/** The next mark up or down from one, round the ends. */
function neighbourOf(
  content: LadderContent,
  current: string | undefined,
  upwards: boolean,
): string | undefined {
  const ids = idsUpwards(content);
  const from = current === undefined ? -1 : ids.indexOf(current);
  const next = upwards ? from + 1 : from === -1 ? ids.length - 1 : from - 1;
  return ids[(next + ids.length) % ids.length];
}

/** The ladder: modes on the left, forcings on the right of a logarithmic frequency axis; wheel, pinch, drag and keys zoom it. */
export function Ladder(props: LadderProps) {
  const { content, sentence, words, shownPerHz = 1, selected = NONE, current, onPick } = props;
  const frame = useRef<HTMLDivElement>(null);
  const drawn = useRef<LadderPicture | undefined>(undefined);
  const size = useElementSize(frame);
  const measure = useMemo(() => (frame.current ? measureLike(frame.current) : undefined), [size]);
  const wholeHz = useMemo(() => ladderRangeHz(content), [content]);
  const zoom = useLadderZoom(frame, wholeHz, () => drawn.current?.axis);
  const isZoomed = zoom.rangeHz !== undefined;

  const picture = useMemo(() => {
    if (!size) return undefined;
    const heightPx = fittingHeightPx(
      props.heightPx ?? (size.widthPx < WIDE_PX ? HEIGHT_PX : WIDE_HEIGHT_PX),
      size.textPx,
      props.heightPx ? 0 : content.forcings.length + content.tones.length,
    );
    const textPx = Math.min(size.textPx, size.widthPx / 24);
    return ladderPicture(content, {
      widthPx: size.widthPx,
      heightPx,
      textPx,
      shownPerHz,
      ...(measure ? { measure } : {}),
      ...(zoom.rangeHz ? { rangeHz: zoom.rangeHz } : {}),
    });
  }, [content, size, measure, zoom.rangeHz, shownPerHz, props.heightPx]);
  drawn.current = picture;

  const pickAt = (event: MouseEvent) => {
    if (!onPick || !picture || zoom.wasDragged()) return;
    const box = (event.currentTarget as Element).getBoundingClientRect();
    const scale = picture.size.widthPx / box.width;
    onPick(ladderItemAt(picture, (event.clientX - box.left) * scale, (event.clientY - box.top) * scale));
  };
  const step = (upwards: boolean) => onPick?.(neighbourOf(content, current, upwards));
  const onKey = keyActs({
    ArrowUp: () => step(true),
    ArrowDown: () => step(false),
    PageUp: () => zoom.pan(true),
    PageDown: () => zoom.pan(false),
    '+': () => zoom.zoom(true),
    '=': () => zoom.zoom(true),
    '-': () => zoom.zoom(false),
    '0': () => zoom.whole(),
    Escape: () => onPick?.(undefined),
  });

  const still = (
    <div ref={frame} class={`${styles.frame} ${isZoomed ? styles.zoomed : ''}`}>
      {picture ? (
        <svg
          class={`${styles.ladder} ladder-drawing`}
          viewBox={`0 0 ${picture.size.widthPx} ${picture.size.heightPx}`}
          width={picture.size.widthPx}
          height={picture.size.heightPx}
          role="img"
          aria-label={sentence}
          onClick={pickAt}
        >
          <SvgShapes shapes={ladderShapes(picture, selected)} />
        </svg>
      ) : (
        <div style={{ height: `${props.heightPx ?? HEIGHT_PX}px` }} />
      )}
    </div>
  );
  if (!onPick) return still;
  const unlabelled = picture?.right.unlabelled.length ?? 0;
  return (
    <div class={styles.whole}>
      <div
        role="group"
        tabIndex={0}
        class={styles.group}
        aria-label={`${words.name}. ${words.keys}`}
        onKeyDown={onKey}
      >
        {still}
      </div>
      {!props.isCompact && (
        <div class={styles.foot}>
          <p class="note">{unlabelled > 0 ? words.hidden?.(unlabelled) : ''}</p>
          <ZoomTools
            words={words}
            of={words.name}
            isZoomed={isZoomed}
            onZoom={(closer) => zoom.zoom(closer)}
            onWhole={() => zoom.whole()}
          />
        </div>
      )}
    </div>
  );
}
