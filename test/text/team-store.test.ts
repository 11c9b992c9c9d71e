import { describe, expect, it } from 'vitest';
import { TEAM_STORE_PROBLEMS } from '../../src/core/model/team-store.ts';
import { teamStoreProblems, teamStoreText as text } from '../../src/text/team-store.ts';

describe('team store sentences', () => {
  it('has one for each problem, each a sentence', () => {
    for (const code of TEAM_STORE_PROBLEMS) expect(teamStoreProblems[code]).toMatch(/^[A-Z].*\.$/s);
  });

  it('counts without decimals and says what a run came to', () => {
    const report = { sentCount: 1234, fetchedCount: 0 };
    expect(text.report({ ...report, end: 'done' })).toBe('Complete: 1,234 sent, 0 fetched.');
    expect(text.report({ sentCount: 0, fetchedCount: 0, end: 'done' })).toBe('Both sides have the same.');
    expect(text.report({ sentCount: 0, fetchedCount: 0, end: 'cancelled' })).toBe(
      'Stopped. What is left goes next time.',
    );
    expect(text.progress({ step: 'fetching', doneCount: 3, totalCount: 1000 })).toBe('Fetching: 3 of 1,000');
    expect(text.progress({ step: 'pausing', doneCount: 0, totalCount: 0 })).toContain('Trying again');
  });

  it('names what was written twice', () => {
    expect(text.conflictOf('spot', 'post 3', 'hint')).toBe('Where to lay the phone of spot “post 3”');
    expect(text.conflictOf('reading', undefined, 'notes')).toBe('Notes of a reading');
    expect(text.valueWithUnit('speedRpm', '1480')).toBe('1480 r/min');
  });
});
