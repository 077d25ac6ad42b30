import fc from 'fast-check';
import { expect, test } from 'vitest';
import { isMissingCode, meansMissing } from '../../server/ingest/missing';
import { decimalEvidence, readNumber, splitUnit } from '../../server/ingest/numbers';

test('every plain number is the one that the language reads', () => {
  fc.assert(
    fc.property(fc.integer(), fc.integer({ min: 0, max: 8 }), fc.constantFrom('.', ','), (digits, decimals, mark) => {
      const text = (digits / 10 ** decimals).toFixed(decimals);
      const read = readNumber(text.replace('.', mark), mark, false);
      expect(read).toEqual({ value: Number(text), decimals });
    }),
  );
});

test.each([
  ['1.5e3', '.', 1500, 0],
  ['-.5', '.', -0.5, 1],
  ['5.', '.', 5, 0],
  ['+7', '.', 7, 0],
  ['123456789012345678', '.', 123456789012345680, 0],
  // locale outputs of 1234567.891 as computed by ICU
  ['1.234.567,891', ',', 1234567.891, 3],
  ['1 234 567,891', ',', 1234567.891, 3],
  ['1’234’567.891', '.', 1234567.891, 3],
  ['1,234,567', '.', 1234567, 0],
  ['1,234.5', '.', 1234.5, 1],
] as const)('%s with decimal mark %s is %d', (text, mark, value, decimals) => {
  expect(readNumber(text, mark, false)).toEqual({ value, decimals });
});

test.each(['1,5', '0x10', 'Infinity', '1_000', '', ' ', '1.2.3', '--5', '3.8O', '1e', '١٢', '12,34,567.8'])(
  '"%s" is no number where the point is the decimal mark',
  (text) => {
    expect(readNumber(text, '.', false)).toBeNull();
  },
);

test('1,234 is a thousand only where the column shows it', () => {
  expect(readNumber('1,234', '.', false)).toBeNull();
  expect(readNumber('1,234', '.', true)).toEqual({ value: 1234, decimals: 0 });
  expect(readNumber('1.234', ',', true)).toEqual({ value: 1234, decimals: 0 });
});

test.each([
  ['12,5', { mark: ',', sure: true }],
  ['1,234', { mark: ',', sure: false }],
  ['0,123', { mark: ',', sure: true }],
  ['1.234,5', { mark: ',', sure: true }],
  ['1,234,567', { mark: '.', sure: true }],
  ['12', null],
])('%s tells of the decimal mark what it can', (text, evidence) => {
  expect(decimalEvidence(text)).toEqual(evidence);
});

test.each(['', 'NAN', 'NaN', 'n/a', 'N/D', '#N/A', 'null', '-', '--', '---', 'ERR', '+OL', '-OL', '******'])(
  '"%s" means a missing value',
  (text) => {
    expect(meansMissing(text)).toBe(true);
  },
);

test('missing codes are exact', () => {
  expect([-9999, -999, -99, 65_535].map(isMissingCode)).toEqual([true, true, false, false]);
});

test('a unit in the cell is split from its number', () => {
  expect(splitUnit('3.80 m')).toEqual({ number: '3.80', unit: 'm' });
  expect(splitUnit('3.8O')).toBeNull();
});
