/** Hash routes: a screen and ids, never a phase of a measurement. Deep links work offline because nothing else is needed. */
import { PROCEDURES, type Procedure } from '../core/model/analysis.ts';
import type { EntityKind } from '../core/model/fact.ts';
import { SOURCE_KINDS, type SourceKind } from '../core/model/source.ts';

export const PHONE_PARTS = [
  'check',
  'storage',
  'limits',
  'about',
  'privacy',
  'cautions',
  'licences',
  'log',
] as const;
export type PhonePart = (typeof PHONE_PARTS)[number];

export type Route =
  | { readonly screen: 'start' }
  | { readonly screen: 'take'; readonly spot?: string; readonly procedure?: Procedure }
  | { readonly screen: 'reading'; readonly id: string }
  | { readonly screen: 'readings'; readonly trashed?: boolean }
  | { readonly screen: 'compare'; readonly first: string; readonly second: string }
  | { readonly screen: 'assets' }
  | { readonly screen: 'site' | 'asset' | 'spot'; readonly id: string }
  | { readonly screen: 'series'; readonly id: string }
  | { readonly screen: 'sources' }
  | {
      readonly screen: 'source';
      /** `new` while it has not been saved. */
      readonly id: string;
      readonly kind?: SourceKind;
      readonly reading?: string;
    }
  | { readonly screen: 'hand-over'; readonly reading?: string }
  | { readonly screen: 'phone'; readonly part?: PhonePart }
  | { readonly screen: 'pace'; readonly frequencyHz?: number }
  | { readonly screen: 'lost'; readonly hash: string };

const withKind = (kind: EntityKind, id: string) => (id.includes(':') ? id : `${kind}:${id}`);
const bare = (id: string) => id.slice(id.indexOf(':') + 1);
const oneOf = <T extends string>(list: readonly T[], value: string | null | undefined): T | undefined =>
  list.find((item) => item === value);

/** Reads `#/screen/id?name=value`; whatever is not understood becomes `lost`. */
export function parseRoute(hash: string): Route {
  const [path = '', query = ''] = hash.replace(/^#\/?/, '').split('?');
  const [screen = '', first, second] = path.split('/').map(decode);
  const asked = new URLSearchParams(query);
  if (screen === '') return { screen: 'start' };
  if (screen === 'take') return takeRoute(asked);
  if (screen === 'source' && first) return sourceRoute(first, asked);
  if (screen === 'compare' && first && second)
    return { screen, first: withKind('reading', first), second: withKind('reading', second) };
  if ((screen === 'reading' || screen === 'site' || screen === 'asset' || screen === 'spot') && first)
    return { screen, id: withKind(screen, first) };
  if (screen === 'series' && first) return { screen, id: withKind('spot', first) };
  return plainRoute(screen, first, asked) ?? { screen: 'lost', hash };
}

function plainRoute(screen: string, first: string | undefined, asked: URLSearchParams): Route | undefined {
  switch (screen) {
    case 'readings':
      return asked.has('trash') ? { screen, trashed: true } : { screen };
    case 'assets':
    case 'sources':
      return { screen };
    case 'hand-over': {
      const reading = asked.get('reading');
      return reading ? { screen, reading: withKind('reading', reading) } : { screen };
    }
    case 'phone': {
      const part = oneOf(PHONE_PARTS, first);
      return part ? { screen, part } : first ? undefined : { screen };
    }
    case 'pace': {
      const frequencyHz = Number(asked.get('hz'));
      return frequencyHz > 0 ? { screen, frequencyHz } : { screen };
    }
    default:
      return undefined;
  }
}

function takeRoute(asked: URLSearchParams): Route {
  const spot = asked.get('spot');
  const procedure = oneOf(PROCEDURES, asked.get('procedure'));
  return {
    screen: 'take',
    ...(spot ? { spot: withKind('spot', spot) } : {}),
    ...(procedure ? { procedure } : {}),
  };
}

function sourceRoute(id: string, asked: URLSearchParams): Route {
  const kind = oneOf(SOURCE_KINDS, asked.get('kind'));
  const reading = asked.get('reading');
  return {
    screen: 'source',
    id: id === 'new' ? id : withKind('source', id),
    ...(kind ? { kind } : {}),
    ...(reading ? { reading: withKind('reading', reading) } : {}),
  };
}

/** The link of a route; `parseRoute(routeHash(r))` is `r`. */
export function routeHash(route: Route): string {
  switch (route.screen) {
    case 'start':
      return '#/';
    case 'take':
      return `#/take${query({ spot: route.spot && bare(route.spot), procedure: route.procedure })}`;
    case 'reading':
    case 'site':
    case 'asset':
    case 'spot':
    case 'series':
      return `#/${route.screen}/${bare(route.id)}`;
    case 'source':
      return `#/source/${bare(route.id)}${query({ kind: route.kind, reading: route.reading && bare(route.reading) })}`;
    case 'compare':
      return `#/compare/${bare(route.first)}/${bare(route.second)}`;
    case 'readings':
      return route.trashed ? '#/readings?trash=1' : '#/readings';
    case 'hand-over':
      return `#/hand-over${query({ reading: route.reading && bare(route.reading) })}`;
    case 'phone':
      return route.part ? `#/phone/${route.part}` : '#/phone';
    case 'pace':
      return `#/pace${query({ hz: route.frequencyHz?.toString() })}`;
    case 'lost':
      return route.hash;
    default:
      return `#/${route.screen}`;
  }
}

function query(values: Readonly<Record<string, string | undefined>>): string {
  const entries = Object.entries(values).filter((entry): entry is [string, string] => Boolean(entry[1]));
  return entries.length ? `?${new URLSearchParams(entries).toString()}` : '';
}

function decode(part: string): string {
  try {
    return decodeURIComponent(part);
  } catch {
    return part;
  }
}
