import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import { readCellsText } from '../../server/exchange/cells-text.ts';
import { CsvError, csvText, guarded, readCsv, unguarded } from '../../server/exchange/csv.ts';
import { decimalsOf, readNumberCell } from '../../server/exchange/number-cell.ts';

const anyHeading = () => true;
const cellsOf = (text: string) => readCsv(text, anyHeading).rows.map(({ cells }) => cells);

describe('CSV by RFC 4180', () => {
  test('is read as the RFC’s own examples say', () => {
    // RFC 4180, section 2: points 2 (last line end optional), 5, 6 and 7, with its "aaa" cells.
    expect(cellsOf('a,b,c\r\naaa,bbb,ccc\r\nzzz,yyy,xxx')).toEqual([
      ['aaa', 'bbb', 'ccc'],
      ['zzz', 'yyy', 'xxx'],
    ]);
    expect(cellsOf('a,b,c\r\n"aaa","bbb","ccc"\r\n')).toEqual([['aaa', 'bbb', 'ccc']]);
    expect(cellsOf('a,b,c\r\n"aaa","b \r\nbb","ccc"\r\n')).toEqual([['aaa', 'b \nbb', 'ccc']]);
    expect(cellsOf('a,b,c\r\n"aaa","b""bb","ccc"\r\n')).toEqual([['aaa', 'b"bb', 'ccc']]);
  });

  test('is written with CRLF, a byte order mark, and quotes where they are needed', () => {
    const text = csvText(
      ['a', 'b'],
      [
        ['x,y', 'say "so"'],
        [-3.5, null],
        ['two\nlines', undefined],
      ],
    );
    expect(text).toBe('\ufeffa,b\r\n"x,y","say ""so"""\r\n-3.5,\r\n"two\nlines",\r\n');
  });

  test.each([
    ['CRLF', '\r\n'],
    ['LF', '\n'],
    ['CR', '\r'],
  ])('takes %s as line end', (_, end) => {
    expect(cellsOf(['a,b', '1,2', '3,4', ''].join(end))).toEqual([
      ['1', '2'],
      ['3', '4'],
    ]);
  });

  test('finds the separator by the headings alone', () => {
    const known = (heading: string) => ['tag', 'name', 'x'].includes(heading);
    const separators = [
      ['tag,name,x\n"a;b;c;d",2;3,4', ','],
      ['tag;name;x\n1,5;2,5;3,5', ';'],
      ['tag\tname\tx\n1,5\t2;5\t3', '\t'],
      ['\ufeff"tag";"name"\na;b', ';'],
    ];
    for (const [text, separator] of separators) expect(readCsv(text!, known).separator).toBe(separator);
  });

  test('counts rows as a spreadsheet does', () => {
    const { headingRow, rows } = readCsv('\n\na,b\n1,2\n,\n"3\nand more",4\n5,6\n', anyHeading);
    expect(headingRow).toBe(3);
    expect(rows.map(({ row }) => row)).toEqual([4, 6, 7]);
  });

  test('says near which row a quotation mark is left open', () => {
    expect(readCsv('a,b\n1,2\n"3,4\n5,6\n', anyHeading).brokenRow).toBe(3);
    expect(readCsv('a,b\n1,2\n', anyHeading).brokenRow).toBeNull();
  });

  test.each([
    ['nothing', '  \n', /nothing in the file/],
    ['a spreadsheet', 'PK\u0003\u0004rest', /save the sheet as CSV/],
    ['zero bytes', 'a,b\n\u0000', /no text/],
    ['a page', '<!DOCTYPE html><p>', /page of the web/],
    ['JSON', '{"tag": "A-01"}', /JSON/],
  ])('refuses %s in a sentence', (_, text, sentence) => {
    expect(() => readCsv(text, anyHeading)).toThrow(CsvError);
    expect(() => readCsv(text, anyHeading)).toThrow(sentence);
  });
});

describe('the guard against formulas', () => {
  // The first characters OWASP names under "CSV injection", bare and behind blanks.
  const starts = ['=', '+', '-', '@', '\t', '\r', '\n', ' =', '\u00a0@', '\t+', "'=", "''-"];

  test.each(starts.map((start) => [JSON.stringify(start), start]))('stands before %s', (_, start) => {
    expect(guarded(`${start}1+1`)).toBe(`'${start}1+1`);
  });

  test('leaves plain text and numbers alone', () => {
    for (const text of ['Lantern', "'tis the gate", 'a=b', '', "' 1"]) expect(guarded(text)).toBe(text);
    expect(csvText(['a'], [[-1.5]])).toContain('\r\n-1.5\r\n');
  });

  test('comes off again: what is written is what is read', () => {
    const start = fc.constantFrom('', ...starts);
    const cell = fc
      .tuple(start, fc.string({ unit: 'grapheme', maxLength: 12 }))
      .map((parts) => parts.join(''));
    fc.assert(
      fc.property(fc.array(fc.tuple(cell, cell), { minLength: 1, maxLength: 5 }), (rows) => {
        const wanted = rows.map((row) => row.map((text) => text.replace(/\r\n?/g, '\n')));
        const marked = wanted.map((row) => ['x', ...row]);
        const read = cellsOf(csvText(['k', 'a', 'b'], marked));
        expect(read.map((cells) => cells.slice(1).map(unguarded))).toEqual(wanted);
      }),
      { numRuns: 1000 },
    );
  });

  test('leaves no cell a spreadsheet would run', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 10 }), (text) => {
        const [row] = Papa.parse<string[]>(csvText(['a', 'b'], [['x', text]]), {
          newline: '\r\n',
        }).data.slice(1);
        expect(row![1]).not.toMatch(/^\s*[=+\-@]/);
      }),
      { numRuns: 1000 },
    );
  });
});

describe('a number in a cell', () => {
  const read = (text: string, field = 'load.meanMa', separator = ';') =>
    readNumberCell(text, { field, separator, decimals: decimalsOf(separator, [text]) });

  test.each([
    ['3.3', 'dimVolts', 3.3],
    ['3,3', 'dimVolts', 3.3],
    ['-3', 'offsetC', -3],
    ['−3,5 °C', 'offsetC', -3.5],
    ['~20mA', 'load.meanMa', 20],
    ['about 20', 'load.meanMa', 20],
    ['0.022 A', 'load.meanMa', 22],
    ['50 µA', 'load.standbyMa', 0.05],
    ['4.5V', 'dimVolts', 4.5],
    ['60 %', 'switching.skyShare', 0.6],
    ['90 min', 'switching.cutOffHours', 1.5],
    ['1e-3', 'load.standbyMa', 0.001],
  ])('%s in %s is %f', (text, field, value) => {
    expect(read(text, field)).toMatchObject({ value });
  });

  test.each([
    ['2500 mAh', ';', /how much a cell holds/],
    ['3,3', ',', /commas part the columns/],
    ['about', ';', /not a number/],
    ['20 mA each', ';', /not a number/],
    ['4 V', ';', /is in V, and mA is wanted/],
    ['1e999', ';', /larger than any number/],
    ['1.2.3', ';', /not a number/],
  ])('%s with "%s" is refused', (text, separator, fault) => {
    expect(read(text, 'load.meanMa', separator)).toEqual({ fault: expect.stringMatching(fault) });
  });

  test('is refused where its mark may be one for thousands', () => {
    const decimals = decimalsOf(';', ['2,4', '1.200']);
    const of = { field: 'load.meanMa', separator: ';' };
    expect(readNumberCell('1.200', { ...of, decimals })).toEqual({ fault: expect.stringContaining('1200') });
    expect(readNumberCell('2,4', { ...of, decimals })).toEqual({ value: 2.4 });
    expect(readNumberCell('1,200', { ...of, decimals: decimalsOf(';', ['2,4', '1,200']) })).toEqual({
      value: 1.2,
    });
  });
});

// The designations are IEC 60086's for the sizes shops call AAA, AA, C and D, and 60285/61951's for nickel.
describe('cells in words', () => {
  test.each([
    ['3xAA', { cellTypeId: 'LR6', series: 3, assumedAlkaline: true }],
    ['3 x AA', { cellTypeId: 'LR6', series: 3, assumedAlkaline: true }],
    ['AA', { cellTypeId: 'LR6', assumedAlkaline: true }],
    ['4 × D zinc-carbon', { cellTypeId: 'R20', series: 4, assumedAlkaline: false }],
    ['2 C alkaline', { cellTypeId: 'LR14', series: 2, assumedAlkaline: false }],
    ['NiMH AA x 3', { cellTypeId: 'HR6', series: 3, assumedAlkaline: false }],
    ['lr03', { cellTypeId: 'LR03', assumedAlkaline: false }],
    ['CR2032', { cellTypeId: 'CR2032', assumedAlkaline: false }],
    ['3xAA ~20mA', { cellTypeId: 'LR6', series: 3, draw: '~20mA', assumedAlkaline: true }],
    ['3xAA, 0.02 A', { cellTypeId: 'LR6', series: 3, draw: '0.02 A', assumedAlkaline: true }],
  ])('%s', (text, wanted) => {
    expect(readCellsText(text)).toEqual(wanted);
  });

  test.each(['', 'battery', '3', 'x', '3xQQ', 'some AA', '2S2P AA', 'constructor'])(
    '%j says nothing',
    (text) => {
      expect(readCellsText(text)).toBeNull();
    },
  );
});
