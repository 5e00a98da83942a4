import { describe, expect, it } from 'vitest';
import {
  chanceWords,
  degrees,
  figures,
  ma,
  readNumber,
  readOffsets,
  splitNumbers,
  wiringWords,
} from '../../../web/words/quantity.ts';

describe('numbers people type', () => {
  it.each([
    ['2,4', 2.4],
    [' 2.4 ', 2.4],
    ['\u22123', -3],
    ['-0,5', -0.5],
    ['+7', 7],
    ['.5', 0.5],
    ['12.', 12],
  ])('%j is %d', (text, value) => {
    expect(readNumber(text)).toBe(value);
  });

  it.each(['', '20mA', '1,234.5', '1e3', '0x10', 'Infinity', '--3', '3-4'])('%j is not read', (text) => {
    expect(readNumber(text)).toBeNull();
  });

  it.each([
    ['0.2\t0.2\t1.4', ['0.2', '0.2', '1.4']],
    ['1; 2; 3', ['1', '2', '3']],
    ['1,5 2,5', ['1,5', '2,5']],
    ['1.5, 2.5', ['1.5', '2.5']],
    ['1,2,3', ['1', '2', '3']],
    ['\u22123.1\n4', ['-3.1', '4']],
    ['', []],
  ])('a pasted row %j is parted', (text, parts) => {
    expect(splitNumbers(text)).toEqual(parts);
  });

  it('reads zones and their offsets, and keeps what it could not read', () => {
    expect(readOffsets('Mill Race: -3\n\nHollow Way = 1,5\nGate')).toEqual({
      offsets: { 'Mill Race': -3, 'Hollow Way': 1.5 },
      unread: ['Gate'],
    });
  });
});

describe('numbers people read', () => {
  it.each([
    [0.022, '0.022'],
    [1.5, '1.5'],
    [1234.6, '1235'],
    [999.6, '1000'],
    [0, '0'],
  ])('%d has the figures %s', (value, text) => {
    expect(figures(value)).toBe(text);
  });

  it('carries the unit, a real minus and no minus zero', () => {
    expect(ma(21)).toBe('21 mA');
    expect(degrees(-3.4)).toBe('\u22123 °C');
    expect(degrees(-0.3)).toBe('0 °C');
  });

  it('never makes a chance a certainty', () => {
    expect(chanceWords(1)).toBe('over 99 %');
    expect(chanceWords(0)).toBe('under 1 %');
    expect(chanceWords(0.333)).toBe('33 %');
  });

  it('tells wiring: end to end adds volts, side by side adds mAh', () => {
    expect(wiringWords(1, 1)).toBe('one cell');
    expect(wiringWords(3, 1)).toBe('3 cells end to end');
    expect(wiringWords(1, 2)).toBe('2 cells side by side');
    expect(wiringWords(4, 2)).toBe('8 cells: 2 rows of 4');
  });
});
