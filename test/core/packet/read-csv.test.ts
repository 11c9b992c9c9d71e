import { existsSync, readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Recording } from '../../../src/core/model/recording.ts';
import { readCsv, type ReadCsvOptions } from '../../../src/core/packet/read-csv.ts';
import { checkReadCsvOnAnyText } from '../../support/any-csv-text.ts';

const SHARED_DATA = '../shared/data';

const read = (text: string, unit?: ReadCsvOptions['unit']) =>
  readCsv(text, unit === undefined ? { name: 'a.csv' } : { name: 'a.csv', unit });

function understood(text: string, unit?: ReadCsvOptions['unit']): Recording {
  const outcome = read(text, unit);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problem));
  return outcome.value;
}

function refused(text: string) {
  const outcome = read(text);
  if (outcome.ok) throw new Error('was understood');
  return outcome.problem;
}

const values = (recording: Recording) => recording.accelerationMps2.map((axis) => Array.from(axis));

describe('readCsv: headers and units', () => {
  it.each([
    ['t,x', 1],
    ['time,ax', 1],
    ['t_s,ax_mps2', 1],
    ['Time (s),Acceleration x (m/s^2)', 1],
    ['time [s],acc_x [m/s²]', 1],
    ['seconds_elapsed,accelX (G)', 9.80665],
    ['t,x_g', 9.80665],
    ['t,acc x [mg]', 0.00980665],
    ['t,ax_m_s2', 1],
  ])('reads "%s" with factor %f to m/s²', (header, factor) => {
    const recording = understood(`${header}\n0,2\n0.01,-4\n`);
    expect(recording.axes).toEqual(['x']);
    expect(values(recording)[0]![0]).toBeCloseTo(2 * factor, 5);
    expect(values(recording)[0]![1]).toBeCloseTo(-4 * factor, 5);
    expect(recording.timeS[1]).toBeCloseTo(0.01, 12);
  });

  it('takes the axes in the order x, y, z whatever the order of the columns', () => {
    const recording = understood('z,time,y,x\n3,0,2,1\n');
    expect(recording.axes).toEqual(['x', 'y', 'z']);
    expect(values(recording)).toEqual([[1], [2], [3]]);
  });

  it('ignores other quantities beside the acceleration, rotation and magnetic field above all', () => {
    const recording = understood('t,gyro_x,mag_y,acc_z,temperature,|a|\n0,9,9,1,9,9\n');
    expect(recording.axes).toEqual(['z']);
    expect(values(recording)).toEqual([[1]]);
  });

  it('prefers the acceleration with gravity to one that the phone has taken gravity out of', () => {
    const recording = understood('t,linear_acc_x,acc_x\n0,0.1,9.9\n');
    expect(values(recording)[0]![0]).toBeCloseTo(9.9, 5);
  });

  it('lets the option override the unit of the header', () => {
    expect(values(understood('t,x (m/s^2)\n0,1\n', 'g'))[0]![0]).toBeCloseTo(9.80665, 5);
  });

  it('skips titles and remarks before the header, and keeps the practice mark', () => {
    const recording = understood('# taken with the practice rig\nHandrail, north run\n\nt,x\n0,1\n');
    expect(recording.sensor).toEqual({ source: 'file', practice: true, name: 'a.csv' });
    expect(understood('t,x\n0,1\n').sensor.practice).toBe(false);
  });
});

describe('readCsv: delimiters, decimals and line ends', () => {
  it.each([
    ['semicolon and decimal comma', 't;x;y\n0,00;1,5;-2\n0,01;1,25;3e-1\n'],
    ['tab and decimal comma', 't\tx\ty\r\n0,00\t1,5\t-2\r\n0,01\t1,25\t3e-1\r\n'],
    ['comma, quoted decimal commas', '"t","x","y"\n"0,00","1,5","-2"\n"0,01","1,25","3e-1"\n'],
    ['comma and point, old Mac line ends', 't,x,y\r0,1.5,-2\r0.01,1.25,.3'],
    ['blank lines, blanks, trailing delimiters', '\ufefft, x ,y,\n0 , 1.5, -2,\n\n 0.01,+1.25,3E-1,\n,,,\n'],
  ])('reads %s', (_, text) => {
    const recording = understood(text);
    expect(Array.from(recording.timeS)).toEqual([0, 0.01]);
    expect(values(recording)).toEqual([
      [1.5, 1.25],
      [-2, Math.fround(0.3)],
    ]);
  });

  it('refuses decimal commas between comma delimiters rather than reading half numbers', () => {
    expect(refused('t,x\n0,01,1,5\n')).toMatchObject({
      code: 'bad-row',
      facts: { row: 2, reason: 'surplus-cell' },
    });
  });

  it('refuses a file that mixes decimal points and commas', () => {
    expect(refused('t;x\n0,01;1,5\n0,02;1.5\n')).toMatchObject({
      code: 'bad-row',
      facts: { row: 3, column: 2 },
    });
  });
});

describe('readCsv: time', () => {
  it.each([
    ['time_ms', ['1000', '1010', '1021']],
    ['t [µs]', ['5000', '15000', '26000']],
    ['timestamp_ns', ['7000000000', '7010000000', '7021000000']],
    ['time', ['1000', '1010', '1021']],
    ['time', ['5000000', '5010000', '5021000']],
    ['timestamp', ['80000000000000', '80000010000000', '80000021000000']],
    ['t', ['12.5', '12.51', '12.521']],
    ['time', ['2026-03-01T23:59:59.995Z', '2026-03-02T00:00:00.005Z', '2026-03-02T00:00:00.016Z']],
    ['date time', ['2026-03-01 10:00:00,000', '2026-03-01 10:00:00,010', '2026-03-01 10:00:00,021']],
    ['time', ['10:59:59.990', '11:00:00.000', '11:00:00.011']],
  ])('reads "%s" as %j', (header, stamps) => {
    const recording = understood(`${header};x\n${stamps.map((stamp) => `${stamp};1`).join('\n')}\n`);
    expect(recording.timeS[0]).toBe(0);
    expect(recording.timeS[1]).toBeCloseTo(0.01, 9);
    expect(recording.timeS[2]).toBeCloseTo(0.021, 9);
  });

  it('knows when a recording began from ISO stamps with a zone and from seconds since 1970', () => {
    expect(understood('time,x\n2026-03-01T10:00:00.250+02:00,1\n').startedAt).toBe(
      '2026-03-01T08:00:00.250Z',
    );
    // 2026-03-01T08:00:00Z is 1772352000 s (from the Gregorian calendar: 20513 days).
    expect(understood('time_ms,x\n1772352000250,1\n').startedAt).toBe('2026-03-01T08:00:00.250Z');
    expect(understood('time,x\n2026-03-01T10:00:00,1\n').startedAt).toBeUndefined();
    expect(understood('t,x\n12,1\n').startedAt).toBeUndefined();
  });

  it('lets equal stamps pass and refuses a step back', () => {
    expect(understood('t,x\n0,1\n0,2\n0.1,3\n').timeS).toHaveLength(3);
    expect(refused('t,x\n0,1\n0.2,2\n0.1,3\n')).toEqual({ code: 'time-not-increasing', facts: { row: 4 } });
  });
});

describe('readCsv: refusals', () => {
  it.each([
    ['', { code: 'no-samples' }],
    ['t,x\n', { code: 'no-samples' }],
    ['foo,bar\n1,2\n', { code: 'bad-header', facts: { row: 1, missing: 'time', found: 'foo,bar' } }],
    ['time,temperature\n1,2\n', { code: 'bad-header', facts: { row: 1, missing: 'acceleration' } }],
    ['t,ax (furlong)\n0,1\n', { code: 'bad-unit', facts: { unit: 'furlong' } }],
    [
      't,x\n0,1\n0.1,abc\n',
      { code: 'bad-row', facts: { row: 3, column: 2, reason: 'not-a-number', found: 'abc' } },
    ],
    ['t,x\n0,1\n\n0.1\n', { code: 'bad-row', facts: { row: 4, column: 2, reason: 'missing-cell' } }],
    ['t,x\nnoon,1\n', { code: 'bad-row', facts: { row: 2, column: 1, reason: 'not-a-time' } }],
    ['t,x\n0,NaN\n', { code: 'bad-row', facts: { row: 2, reason: 'not-a-number' } }],
    ['t,x\n0,1e99\n', { code: 'bad-row', facts: { row: 2, reason: 'not-a-number' } }],
    ['t,x\n2026-13-01T00:00:00Z,1\n', { code: 'bad-row', facts: { row: 2, reason: 'not-a-time' } }],
  ])('%j -> %j', (text, problem) => {
    expect(refused(text)).toMatchObject(problem);
  });

  it('counts rows as an editor does, line ends inside quotes included', () => {
    expect(refused('t,x,note\n0,1,"two\nlines"\n0.1,?,\n')).toMatchObject({ facts: { row: 4 } });
  });
});

describe('readCsv: properties', () => {
  const decimal = fc.double({ min: -1e3, max: 1e3, noNaN: true, noDefaultInfinity: true });

  it('reads back what was written, in every notation', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.double({ min: 1e-4, max: 1, noNaN: true }), decimal), {
          minLength: 1,
          maxLength: 30,
        }),
        fc.constantFrom([',', '.'], [';', ','], [';', '.'], ['\t', ',']),
        fc.constantFrom('\n', '\r\n'),
        (rows, [delimiter, sign], lineEnd) => {
          let t = 0;
          const times = rows.map(([step]) => (t += step));
          const cell = (value: number) => String(value).replace('.', sign!);
          const lines = rows.map(([, value], i) => cell(times[i]!) + delimiter + cell(value));
          const recording = understood([`t_s${delimiter}x`, ...lines].join(lineEnd));
          rows.forEach(([, value], i) => {
            expect(recording.timeS[i]).toBeCloseTo(times[i]! - times[0]!, 9);
            // === and not toBe: -0 and 0 are one reading.
            expect(recording.accelerationMps2[0]![i] === Math.fround(value)).toBe(true);
          });
        },
      ),
    );
  });

  it('never throws: any text is understood in full or refused with a known code', () => {
    checkReadCsvOnAnyText(2000);
  });
});

describe('readCsv: measured recordings', () => {
  it.skipIf(!existsSync(SHARED_DATA))(
    'reads every recording, and refuses the spectrum, which has no time',
    () => {
      const files = readdirSync(SHARED_DATA).filter((file) => file.endsWith('.csv'));
      expect(files.length).toBeGreaterThan(10);
      for (const file of files) {
        const text = readFileSync(`${SHARED_DATA}/${file}`, 'utf8');
        const outcome = read(text);
        expect([file, outcome.ok]).toEqual([file, !file.includes('spectrum')]);
        if (outcome.ok) expect(outcome.value.timeS).toHaveLength(text.trim().split('\n').length - 1);
      }
    },
  );
});
