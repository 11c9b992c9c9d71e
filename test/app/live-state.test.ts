import { describe, expect, it } from 'vitest';
import { live } from '../../src/app/live-state.ts';

describe('live', () => {
  it('tells every change to those who listen, until they stop', () => {
    const state = live(1);
    const heard: number[] = [];
    const stop = state.subscribe((value) => heard.push(value));
    state.set(2);
    state.set(2);
    stop();
    state.set(3);
    expect(heard).toEqual([2]);
    expect(state.get()).toBe(3);
  });

  it('lets a listener stop while it is told', () => {
    const state = live('a');
    const heard: string[] = [];
    const stop = state.subscribe(() => stop());
    state.subscribe((value) => heard.push(value));
    state.set('b');
    expect(heard).toEqual(['b']);
  });
});
