/** Where to lay the phone, drawn by us: the structure in ink, the phone in the accent, the knock as three short arcs. */
import type { ComponentChildren } from 'preact';
import type { SpotKind } from '../../core/model/place.ts';
import styles from './placement-drawing.module.css';

const Phone = ({ x, y, turn = 0 }: { readonly x: number; readonly y: number; readonly turn?: number }) => (
  <g transform={`translate(${x} ${y}) rotate(${turn})`}>
    <rect class={styles.phone} x="-20" y="-9" width="40" height="9" rx="3" />
    <path class={styles.glint} d="M-14 -4.5H8" />
  </g>
);

const Knock = ({ x, y, turn = 0 }: { readonly x: number; readonly y: number; readonly turn?: number }) => (
  <path
    class={styles.knock}
    transform={`translate(${x} ${y}) rotate(${turn})`}
    d="M-5 -6A7 7 0 0 1 5 -6M-9 -12A14 14 0 0 1 9 -12M-13 -18A21 21 0 0 1 13 -18"
  />
);

const Ground = ({ y = 128 }: { readonly y?: number }) => (
  <path
    class={styles.thin}
    d={`M10 ${y}H230M22 ${y + 8}l8 -8M52 ${y + 8}l8 -8M82 ${y + 8}l8 -8M112 ${y + 8}l8 -8M142 ${y + 8}l8 -8M172 ${y + 8}l8 -8M202 ${y + 8}l8 -8`}
  />
);

const DRAWINGS: Readonly<Record<SpotKind, ComponentChildren>> = {
  handrail: (
    <>
      <path class={styles.ink} d="M8 54H232M8 62H232M44 62V128M196 62V128M44 98H196" />
      <Ground />
      <Phone x={120} y={54} />
      <Knock x={164} y={52} />
    </>
  ),
  stair: (
    <>
      <path class={styles.ink} d="M14 128H60V106H102V84H144V62H186V40H230" />
      <path class={styles.thin} d="M60 128L186 62M230 40L214 48" />
      <Phone x={124} y={84} />
      <Knock x={166} y={60} />
    </>
  ),
  floor: (
    <>
      <path class={styles.ink} d="M56 44H184L232 112H8Z" />
      <path
        class={styles.thin}
        d="M88 44L64 112M120 44V112M152 44L176 112M42 64H198M27 86H213M8 112V124H232V112"
      />
      <Phone x={120} y={84} />
      <Knock x={168} y={80} />
    </>
  ),
  footbridge: (
    <>
      <path class={styles.ink} d="M6 82Q120 66 234 82M6 92Q120 76 234 92M30 90V128M210 90V128" />
      <path
        class={styles.thin}
        d="M8 52Q120 36 232 52M30 50V80M75 44V75M165 44V75M210 50V80M56 128Q120 120 184 128"
      />
      <Phone x={120} y={74} />
      <Knock x={160} y={70} />
    </>
  ),
  'bearing-housing': (
    <>
      <path class={styles.ink} d="M66 112V84A54 54 0 0 1 174 84V112ZM46 112H194V126H46Z" />
      <circle class={styles.ink} cx="120" cy="84" r="24" />
      <circle class={styles.thin} cx="120" cy="84" r="12" />
      <Ground />
      <Phone x={120} y={30} />
      <Knock x={186} y={62} turn={60} />
    </>
  ),
  'machine-base': (
    <>
      <path
        class={styles.ink}
        d="M62 92V44H154V92M154 56H184V82H154M184 66H204V72H184M36 92H204V106H36ZM44 106V128M196 106V128"
      />
      <path class={styles.thin} d="M76 54H140M76 64H140M76 74H140M76 84H140" />
      <Ground />
      <Phone x={184} y={92} />
      <Knock x={44} y={90} />
    </>
  ),
  'fan-frame': (
    <>
      <path class={styles.ink} d="M58 22H182V118H58ZM70 118V128M170 118V128" />
      <circle class={styles.ink} cx="120" cy="70" r="38" />
      <path
        class={styles.thin}
        d="M120 70C112 52 118 40 130 38C132 52 130 62 120 70C136 68 148 76 146 88C132 88 124 82 120 70C108 84 96 84 90 74C98 64 108 64 120 70"
      />
      <Ground />
      <Phone x={182} y={70} turn={90} />
      <Knock x={60} y={56} turn={-90} />
    </>
  ),
  pipe: (
    <>
      <path class={styles.ink} d="M6 62H234M6 88H234M48 88V128M192 88V128M36 88H60M180 88H204" />
      <path class={styles.strap} d="M106 53V92M134 53V92" />
      <Ground />
      <Phone x={120} y={62} />
      <Knock x={164} y={60} />
    </>
  ),
  foundation: (
    <>
      <path class={styles.ink} d="M70 20V84H34V116H206V84H94V20" />
      <path class={styles.thin} d="M44 94h10M70 106h10M98 94h10M130 106h10M160 94h10M184 106h10" />
      <Ground y={116} />
      <Phone x={132} y={84} />
      <Knock x={182} y={82} />
    </>
  ),
  'top-floor': (
    <>
      <path class={styles.ink} d="M52 128V36L120 10L188 36V128M52 64H188M52 96H188" />
      <path
        class={styles.thin}
        d="M70 76h16v14h-16zM154 76h16v14h-16zM70 106h16v14h-16zM154 106h16v14h-16z"
      />
      <Ground />
      <Phone x={78} y={64} />
      <Knock x={130} y={62} />
    </>
  ),
  other: (
    <>
      <path class={styles.ink} d="M20 82H220V92H20ZM34 92L22 128H46ZM206 92L194 128H218Z" />
      <Ground />
      <Phone x={120} y={82} />
      <Knock x={166} y={80} />
    </>
  ),
};

/** Hidden from screen readers: the sentence beside it says the same. */
export function PlacementDrawing({ kind, small }: { readonly kind: SpotKind; readonly small?: boolean }) {
  return (
    <svg
      class={small ? styles.small : styles.drawing}
      viewBox="0 0 240 140"
      aria-hidden="true"
      focusable="false"
    >
      {DRAWINGS[kind]}
    </svg>
  );
}
