import { describe, expect, it } from 'vitest';
import { parseAnalyseArguments } from '../../src/cli/analyse-arguments.ts';

describe('parseAnalyseArguments', () => {
  it('defaults to automatic procedure and timing and the unit of the header', () => {
    expect(parseAnalyseArguments(['a.csv', 'b.csv'])).toEqual({
      settings: { procedure: 'auto', timing: 'auto' },
      files: ['a.csv', 'b.csv'],
    });
  });

  it('takes options before, between and after files, with a blank or an equals sign', () => {
    const args = [
      '--procedure',
      'tap',
      'a.csv',
      '--timing=clock',
      '--unit',
      'mg',
      'b.csv',
      '--sources=s.json',
    ];
    expect(parseAnalyseArguments(args)).toEqual({
      settings: { procedure: 'tap', timing: 'clock' },
      unit: 'mg',
      sourcesPath: 's.json',
      files: ['a.csv', 'b.csv'],
    });
  });

  it('takes whatever follows -- as files', () => {
    expect(parseAnalyseArguments(['--', '--odd.csv'])).toMatchObject({ files: ['--odd.csv'] });
  });

  it.each([
    [[], 'Name at least one file.'],
    [['--unit'], '--unit needs a value.'],
    [['--unit', 'furlong', 'a.csv'], '--unit must be one of mps2, g, mg, not "furlong".'],
    [['--procedure', 'tapping', 'a.csv'], '--procedure must be one of tap, running'],
    [['--fast', 'a.csv'], 'Unknown option --fast.'],
  ])('%j: %s', (args, message) => {
    expect(parseAnalyseArguments(args)).toContain(message);
  });
});
