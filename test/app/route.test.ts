import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseRoute, PHONE_PARTS, routeHash, type Route } from '../../src/app/route.ts';
import { PROCEDURES } from '../../src/core/model/analysis.ts';
import { SOURCE_KINDS } from '../../src/core/model/source.ts';

const ulid = fc.string({
  unit: fc.constantFrom(...'0123456789ABCDEFGHJKMNPQRSTVWXYZ'),
  minLength: 26,
  maxLength: 26,
});
const idOf = (kind: string) => ulid.map((id) => `${kind}:${id}`);
const optional = <T>(values: fc.Arbitrary<T>) => fc.option(values, { nil: undefined });
const withoutNothing = <T extends object>(route: T) =>
  Object.fromEntries(Object.entries(route).filter(([, value]) => value !== undefined)) as unknown as Route;

const anyRoute: fc.Arbitrary<Route> = fc.oneof(
  fc.constantFrom<Route>(
    { screen: 'start' },
    { screen: 'assets' },
    { screen: 'sources' },
    { screen: 'readings' },
  ),
  fc
    .record({
      screen: fc.constant('take'),
      spot: optional(idOf('spot')),
      procedure: optional(fc.constantFrom(...PROCEDURES)),
    })
    .map(withoutNothing),
  ...(['reading', 'site', 'asset', 'spot'] as const).map((screen) =>
    idOf(screen).map((id): Route => ({ screen, id })),
  ),
  idOf('spot').map((id): Route => ({ screen: 'series', id })),
  fc.record({ screen: fc.constant('compare' as const), first: idOf('reading'), second: idOf('reading') }),
  fc
    .record({
      screen: fc.constant('source'),
      id: fc.oneof(fc.constant('new'), idOf('source')),
      kind: optional(fc.constantFrom(...SOURCE_KINDS)),
      reading: optional(idOf('reading')),
    })
    .map(withoutNothing),
  fc
    .record({ screen: fc.constant('phone'), part: optional(fc.constantFrom(...PHONE_PARTS)) })
    .map(withoutNothing),
  fc.constant<Route>({ screen: 'readings', trashed: true }),
  fc
    .double({ min: 0.1, max: 50, noNaN: true })
    .map((frequencyHz): Route => ({ screen: 'pace', frequencyHz })),
);

describe('routes', () => {
  it('come back from their own links (any route)', () => {
    fc.assert(
      fc.property(anyRoute, (route) => {
        expect(parseRoute(routeHash(route))).toEqual(route);
      }),
    );
  });

  it('never throw, whatever the address says', () => {
    fc.assert(
      fc.property(fc.string(), (hash) => {
        expect(parseRoute(`#/${hash}`).screen).toBeTypeOf('string');
      }),
    );
    expect(parseRoute('#/reading/%E0%A4%A')).toMatchObject({ screen: 'reading' });
  });

  it.each(['#/nowhere', '#/reading', '#/compare/a', '#/phone/elsewhere', '#/source'])(
    '%s leads nowhere',
    (hash) => {
      expect(parseRoute(hash)).toEqual({ screen: 'lost', hash });
    },
  );

  it('take unknown words in the query for absent', () => {
    expect(parseRoute('#/take?procedure=dance')).toEqual({ screen: 'take' });
    expect(parseRoute('#/pace?hz=-3')).toEqual({ screen: 'pace' });
  });
});
