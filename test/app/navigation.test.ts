import { describe, expect, it } from 'vitest';
import { createNavigation } from '../../src/app/navigation.ts';

/** As much of a window as a history needs: entries with state and hash, and popstate on going back. */
function fakeWindow(hash = '#/') {
  const entries = [{ state: null as unknown, hash }];
  let at = 0;
  let onPop = () => {};
  const page = {
    location: {
      get hash() {
        return entries[at]?.hash ?? '';
      },
    },
    history: {
      get state() {
        return entries[at]?.state;
      },
      pushState(state: unknown, _: string, next: string) {
        entries.splice(at + 1, entries.length, { state, hash: next });
        at += 1;
      },
      replaceState(state: unknown, _: string, next?: string) {
        entries[at] = { state, hash: next ?? entries[at]?.hash ?? '' };
      },
      back() {
        at -= 1;
        onPop();
      },
    },
    addEventListener: (_: string, listener: () => void) => {
      onPop = listener;
    },
    /** A link that a person follows: the browser pushes the entry, without our state. */
    follow(next: string) {
      entries.splice(at + 1, entries.length, { state: null, hash: next });
      at += 1;
      onPop();
    },
    entries,
  };
  return page as typeof page & Window;
}

describe('navigation', () => {
  it('goes on and back like any page', () => {
    const page = fakeWindow();
    const navigation = createNavigation(page);
    navigation.go({ screen: 'assets' });
    expect(navigation.route.get()).toEqual({ screen: 'assets' });
    navigation.back({ screen: 'start' });
    expect(navigation.route.get()).toEqual({ screen: 'start' });
  });

  it('goes back to the fallback where a deep link has nothing behind it', () => {
    const page = fakeWindow('#/spot/01A');
    const navigation = createNavigation(page);
    navigation.back({ screen: 'assets' });
    expect(navigation.route.get()).toEqual({ screen: 'assets' });
    expect(page.entries).toHaveLength(1);
  });

  it('follows links that the browser opened itself', () => {
    const page = fakeWindow();
    const navigation = createNavigation(page);
    page.follow('#/sources');
    expect(navigation.route.get()).toEqual({ screen: 'sources' });
    navigation.back({ screen: 'assets' });
    expect(navigation.route.get()).toEqual({ screen: 'start' });
  });

  it('leaves out a step that was replaced', () => {
    const page = fakeWindow();
    const navigation = createNavigation(page);
    navigation.go({ screen: 'take' });
    navigation.replace({ screen: 'reading', id: 'reading:01A' });
    navigation.back({ screen: 'assets' });
    expect(navigation.route.get()).toEqual({ screen: 'start' });
  });

  it('does not pile up the same address', () => {
    const page = fakeWindow();
    const navigation = createNavigation(page);
    navigation.go({ screen: 'start' });
    expect(page.entries).toHaveLength(1);
  });
});
