import { expect, test } from 'vitest';
import { parseMeasurement } from '../../main/files/measurement-file.ts';
import { appFailure } from '../support/app-failure.ts';

/** Oracle: the table as a laboratory exports it, read by eye. */

test.each([
  ['Hz without a header', '50e6,31.5\n125000000,38'],
  ['MHz, semicolons, quotes', '"Frequency [MHz]";"QP [dBµV/m]"\n"50";"31.5"\n125;38\n'],
  ['kHz, tabs', 'f (kHz)\tE (dBuV/m)\n50000\t31.5\n125000\t38\n'],
  ['GHz, spaces, blank lines', 'GHz dBμV/m\n\n0.05 31.5\n\n0.125 38\n'],
])('%s', (_name, text) => {
  const points = parseMeasurement('lab.csv', text);
  expect(points.map(({ levelDbuvPerM }) => levelDbuvPerM)).toEqual([31.5, 38]);
  expect(points[0]!.frequencyHz).toBeCloseTo(50e6, 3);
  expect(points[1]!.frequencyHz).toBeCloseTo(125e6, 3);
});

test('detectors by their usual letters; quasi-peak where none is named', () => {
  const text = 'MHz,dBµV/m,Detector\n30,1,QP\n31,2,PK\n32,3,AVG\n33,4,Quasi-Peak\n34,5,\n35,6\n';
  expect(parseMeasurement('lab.csv', text).map(({ detector }) => detector)).toEqual([
    'quasi-peak',
    'peak',
    'average',
    'quasi-peak',
    'quasi-peak',
    'quasi-peak',
  ]);
});

test.each([
  ['levels of a receiver’s input', 'MHz,dBµV\n30,40\n', 'the levels must be in dBµV/m; received dbµv'],
  ['powers', 'MHz;dBm\n30;-60\n', 'the levels must be in dBµV/m; received dbm'],
  ['magnetic fields', 'MHz,dBµA/m\n30,-10\n', 'the levels must be in dBµV/m; received dbµa/m'],
  ['no table', 'nothing here', 'received no row of two numbers'],
  ['an empty file', '', 'received no row of two numbers'],
  ['a later row that is none', '30e6,40\n31e6,n/a\n', 'line 2 must be a row of frequency and level'],
  ['a frequency of 0', 'MHz,dBµV/m\n0,40\n', 'line 2 must be a frequency above 0'],
])('%s: refused in words', (_name, text, message) => {
  const failure = appFailure(() => parseMeasurement('lab.csv', text));
  expect(failure.code).toBe('file');
  expect(failure.message).toMatch(/^lab\.csv: /);
  expect(failure.message).toContain(message);
});
