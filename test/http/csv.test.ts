import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { PROP_COLUMNS } from '../../server/exchange/props-csv.ts';
import type { PropsImported } from '../../server/http/schemas/csv.ts';
import { NewProp, type Prop } from '../../server/http/schemas/props.ts';
import { A_SITE, aProp, aSiteWithProp } from '../rig/a-site.ts';
import { aRig, dumpOf, type Rig } from '../rig/build-app.ts';

const HEADINGS = 'tag,name,zone,cellTypeId,series,dimVolts,load.behaviour,load.meanMa,switching.kind';
const rowOf = (changes: Partial<Record<string, string>> = {}) => {
  const cells: Record<string, string> = {
    tag: 'B-01',
    name: 'Path lantern',
    zone: 'Path',
    cellTypeId: 'LR6',
    series: '3',
    dimVolts: '3.3',
    'load.behaviour': 'steady',
    'load.meanMa': '20',
    'switching.kind': 'by-hand',
    ...changes,
  };
  return HEADINGS.split(',')
    .map((field) => cells[field])
    .join(',');
};
const fileOf = (...rows: string[]) => [HEADINGS, ...rows].join('\n');

type Imported = PropsImported;
async function send(rig: Rig, siteId: string, text: string | Buffer, dryRun = false): Promise<Imported> {
  const answer = await rig.ask
    .post(`/api/sites/${siteId}/props/import?dryRun=${dryRun}`)
    .set('content-type', 'text/csv')
    .send(text)
    .expect(200);
  return answer.body;
}
const exported = async (rig: Rig, siteId: string): Promise<string> =>
  (await rig.ask.get(`/api/sites/${siteId}/props.csv`).expect(200)).text;
const propsOf = async (rig: Rig, siteId: string): Promise<Prop[]> =>
  (await rig.ask.get(`/api/props?siteId=${siteId}`).expect(200)).body;

describe('taking props in', () => {
  test('adds what is new, and only says so on a dry run', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const before = dumpOf(rig.store);
    const file = fileOf(rowOf(), rowOf({ tag: 'B-02' }));
    const dry = await send(rig, site.id, file, true);
    expect(dry).toMatchObject({ rows: 2, accepted: 2, added: 2, changed: 0, rejected: [], unlisted: 0 });
    expect(dry.changes.map(({ row, tag, isNew }) => [row, tag, isNew])).toEqual([
      [2, 'B-01', true],
      [3, 'B-02', true],
    ]);
    expect(dumpOf(rig.store)).toBe(before);

    expect(await send(rig, site.id, file)).toEqual(dry);
    const [added] = await propsOf(rig, site.id);
    expect(added).toEqual({
      id: added!.id,
      siteId: site.id,
      tag: 'B-01',
      name: 'Path lantern',
      zone: 'Path',
      units: 1,
      importance: 'feature',
      cellTypeId: 'LR6',
      series: 3,
      parallel: 1,
      dimVolts: 3.3,
      load: { behaviour: 'steady', meanMa: 20, standbyMa: 0 },
      switching: { kind: 'by-hand' },
    });
  });

  test('a known tag changes the given columns and nothing else', async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig, { stopVolts: 2.8, xM: -4 });
    const report = await send(rig, site.id, 'tag,load.meanMa,stopVolts,name\nC-02,31,,\n');
    expect(report).toMatchObject({ accepted: 1, added: 0, changed: 1 });
    expect(report.changes[0]!.fields.sort()).toEqual(['load.meanMa', 'stopVolts']);
    const { stopVolts: _, ...rest } = prop;
    expect(await propsOf(rig, site.id)).toEqual([{ ...rest, load: { ...prop.load, meanMa: 31 } }]);
    // Once more changes nothing, and the forecast keeps its mark.
    const before = dumpOf(rig.store);
    expect(await send(rig, site.id, 'tag,load.meanMa\nC-02,31\n')).toMatchObject({
      changed: 0,
      unchanged: 1,
    });
    expect(dumpOf(rig.store)).toBe(before);
  });

  test('another kind of switching takes the old one’s fields along', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const file = 'tag;switching.kind;switching.onAt;switching.offAt\nC-02;clock;9:30;22:00:00\n';
    const { notes } = await send(rig, site.id, file);
    expect(notes.map(({ field }) => field)).toEqual(['switching.onAt', 'switching.offAt']);
    const [prop] = await propsOf(rig, site.id);
    expect(prop!.switching).toEqual({ kind: 'clock', onAt: '09:30', offAt: '22:00' });
  });

  test('one faulty row keeps all of them out', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const before = dumpOf(rig.store);
    const file = fileOf(rowOf(), rowOf({ tag: 'B-02', dimVolts: '33' }), rowOf({ tag: 'B-03' }));
    for (const dryRun of [true, false]) {
      const report = await send(rig, site.id, file, dryRun);
      expect(report).toMatchObject({ rows: 3, accepted: 0, added: 2 });
      expect(report.rejected.map(({ row, field }) => [row, field])).toEqual([[3, 'dimVolts']]);
    }
    expect(dumpOf(rig.store)).toBe(before);
  });

  test('sets in words and draws with units are read and said back', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const file =
      'Tag\tName\tZone\tCells\tDim volts\tBehaviour\tStandby mA\tKind\tRemarks\nB-01\tFirst\tPath\t3xAA ~20mA\t3,3\tsteady\t50 µA\tby-hand\tby the oak\n';
    const report = await send(rig, site.id, file);
    expect(report.rejected).toEqual([]);
    const [prop] = await propsOf(rig, site.id);
    expect(prop).toMatchObject({ cellTypeId: 'LR6', series: 3, parallel: 1, dimVolts: 3.3 });
    expect(prop!.load).toEqual({ behaviour: 'steady', meanMa: 20, standbyMa: 0.05 });
    const said = report.notes.map(({ field, message }) => `${field}: ${message}`).join('\n');
    expect(said).toMatch(/cells: "3xAA ~20mA" was read as LR6, 3 end to end\. Alkaline was taken/);
    expect(said).toMatch(/load\.meanMa: "~20mA" was read as 20 mA/);
    expect(said).toMatch(/file: Commas inside numbers/);
    expect(said).toMatch(/Remarks: .*left aside/);
  });

  test('is also taken as a form upload, in Latin-1 and in UTF-16', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const file = fileOf(rowOf({ name: 'Lämpchen' }));
    await rig.ask
      .post(`/api/sites/${site.id}/props/import`)
      .attach('file', Buffer.from(file, 'latin1'), { filename: 'a.csv', contentType: 'text/csv' })
      .expect(200);
    expect((await propsOf(rig, site.id))[0]!.name).toBe('Lämpchen');
    const wide = Buffer.from(`\ufeff${fileOf(rowOf({ tag: 'B-02', name: 'Größe' }))}`, 'utf16le');
    await send(rig, site.id, wide);
    expect((await propsOf(rig, site.id))[1]!.name).toBe('Größe');
  });
});

describe('a faulty file', () => {
  const C02 = 'tag,dimVolts\nC-02,';
  const table: [what: string, file: string, faults: [row: number, field: string, sentence: RegExp][]][] = [
    ['a text for a number', `${C02}low\n`, [[2, 'dimVolts', /"low" is not a number/]]],
    ['a number too large', `${C02}330\n`, [[2, 'dimVolts', /330 is above 60.*whole set/]]],
    ['a dim point above a fresh set', `${C02}7\n`, [[2, 'dimVolts', /7 V is more than a fresh set gives/]]],
    ['a decimal comma among commas', `${C02}"3,1"\n`, [[2, 'dimVolts', /commas part the columns.*3\.1/]]],
    ['one cell too many', `${C02}3,1\n`, [[2, 'file', /3 cells under 2 headings.*decimal commas/]]],
    ['one cell too few', 'tag,dimVolts\nC-02\n', [[2, 'file', /1 cells under 2 headings/]]],
    ['mAh for a draw', 'tag,load.meanMa\nC-02,2500 mAh\n', [[2, 'load.meanMa', /how much a cell holds/]]],
    ['an unknown cell type', 'tag,cellTypeId\nC-02,LR7\n', [[2, 'cellTypeId', /No cell type.*"LR6"/]]],
    ['unknown cells in words', 'tag,cells\nC-02,battery\n', [[2, 'cells', /does not say which cells/]]],
    [
      'two counts',
      'tag,cells,series\nC-02,3xAA,4\n',
      [[2, 'cells', /3 cells stand here, and series says 4/]],
    ],
    ['a word misspelt', 'tag,importance\nC-02,featur\n', [[2, 'importance', /Did you mean "feature"/]]],
    [
      'a field of another switching',
      'tag,switching.onHours\nC-02,6\n',
      [[2, 'switching.onHours', /not a field here/]],
    ],
    ['the same tag twice', `${C02}3\nC-02,3\n`, [[3, 'tag', /stands in row 2 too/]]],
    ['no tag in a row', 'tag,name\n,Gate\n', [[2, 'tag', /has no tag/]]],
    ['no tag column', 'name,zone\nGate,Path\n', [[1, 'tag', /no column "tag"/]]],
    [
      'a heading nearly right',
      'tag,dimVolt\nC-02,3\n',
      [[1, 'dimVolt', /no column here\. Did you mean "dimVolts"/]],
    ],
    ['a column twice', 'tag,dimVolts,Dim Volts\nC-02,3,4\n', [[1, 'dimVolts', /Two columns are dimVolts/]]],
    ['a quotation mark left open', 'tag,name\nC-02,"Moth\nC-03,Owl\n', [[2, 'file', /never closed/]]],
    [
      'columns new props need',
      'tag,name,zone,cells,load.behaviour,load.meanMa,switching.kind\nB-01,a,b,3xAA,steady,20,always\nB-02,a,b,3xAA,steady,20,always\n',
      [[1, 'dimVolts', /no column "dimVolts", and 2 rows need it/]],
    ],
    [
      'several faults',
      fileOf(rowOf({ series: '0', 'load.behaviour': '' }), rowOf({ tag: 'B-02', zone: '', dimVolts: 'x' })),
      [
        [2, 'series', /0 is below 1/],
        [2, 'load.behaviour', /missing/],
        [3, 'dimVolts', /not a number/],
        [3, 'zone', /missing/],
      ],
    ],
  ];

  test.each(table)('with %s', async (_, file, faults) => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const before = dumpOf(rig.store);
    const { accepted, rejected } = await send(rig, site.id, file);
    expect(accepted).toBe(0);
    const key = ({ row, field }: { row: number; field: string }) => `${row} ${field}`;
    expect(rejected.map(key).sort()).toEqual(faults.map(([row, field]) => `${row} ${field}`).sort());
    for (const [row, field, sentence] of faults) {
      const { message } = rejected.find((fault) => key(fault) === `${row} ${field}`)!;
      expect(message).toMatch(sentence);
      expect(message).toMatch(/[.?]$/);
    }
    expect(dumpOf(rig.store)).toBe(before);
  });

  test.each(['', 'hello', 'a,b\n1,2\n', '\u0000\u0001', '{"tag": "A"}', '<html>', 'PK\u0003\u0004'])(
    'that is none is refused: %j',
    async (body) => {
      const rig = await aRig();
      const { site } = await aSiteWithProp(rig);
      const address = `/api/sites/${site.id}/props/import`;
      const answer = await rig.ask.post(address).set('content-type', 'text/csv').send(body).expect(400);
      expect(answer.body.errors).toEqual([{ field: 'file', message: expect.stringMatching(/\w{3,}.*\./) }]);
    },
  );

  test('of any kind gets an answer, and changes nothing unless it is taken whole', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const before = dumpOf(rig.store);
    const piece = fc.constantFrom(
      ...HEADINGS.split(','),
      ...[
        'C-02',
        ',',
        ';',
        '\t',
        '\n',
        '\r',
        '"',
        "'",
        '=',
        '3xAA',
        '-1',
        '1e999',
        '__proto__',
        'trips.seconds',
        '\ufeff',
      ],
    );
    const text = fc.array(fc.oneof(piece, fc.string({ unit: 'binary', maxLength: 4 })), { maxLength: 40 });
    await fc.assert(
      fc.asyncProperty(text, fc.boolean(), async (parts, withTag) => {
        const body = `${withTag ? 'tag,' : ''}${parts.join('')}`;
        const answer = await rig.ask
          .post(`/api/sites/${site.id}/props/import?dryRun=true`)
          .set('content-type', 'text/csv')
          .send(body);
        expect([200, 400], body).toContain(answer.status);
      }),
      { numRuns: 150 },
    );
    expect(dumpOf(rig.store)).toBe(before);
  });

  test('is refused for an unknown site, a strange question or another kind of content', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const ask = (address: string) =>
      rig.ask.post(address).set('content-type', 'text/csv').send(fileOf(rowOf()));
    await ask('/api/sites/gone/props/import').expect(404);
    await ask(`/api/sites/${site.id}/props/import?dryRun=perhaps`).expect(400);
    await ask(`/api/sites/${site.id}/props/import?dry=true`).expect(400);
    await rig.ask.post(`/api/sites/${site.id}/props/import`).send({ tag: 'A' }).expect(415);
    for (const name of ['props', 'log', 'forecast'])
      await rig.ask.get(`/api/sites/gone/${name}.csv`).expect(404);
  });
});

/** Names of all leaves of the body that makes a prop. */
function leavesOf(schema: { properties?: object; anyOf?: object[] }, above = ''): string[] {
  if (schema.anyOf) return schema.anyOf.flatMap((branch) => leavesOf(branch, above));
  if (!schema.properties) return [above];
  return Object.entries(schema.properties).flatMap(([name, inner]) =>
    leavesOf(inner as object, above === '' ? name : `${above}.${name}`),
  );
}

describe('giving props out', () => {
  test('has a column for every field a prop may have', () => {
    const leaves = new Set(leavesOf(NewProp).filter((field) => field !== 'siteId'));
    expect([...PROP_COLUMNS].sort()).toEqual([...leaves].sort());
  });

  test('and taking them in again gives the same bytes, on this site and on another', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig, {
      name: '=HYPERLINK("x")',
      zone: "'-mill",
      xM: -3.5,
      yM: 1e-7,
    });
    const others: Parameters<typeof aProp>[1][] = [
      { tag: '-1', name: '  +1, "2"; 3\n@4', offsetC: -2 },
      { tag: 'A-10', switching: { kind: 'clock', onAt: '18:00', offAt: '00:30' }, units: 12 },
      {
        tag: 'A-2',
        switching: { kind: 'interval-timer', onHours: 6, setAt: '2026-10-01T17:30:00.250+01:00' },
      },
      {
        tag: 'A-3',
        load: { behaviour: 'steady', standbyMa: 0.3 },
        trips: { perShowNight: 120, perNightOff: 0, seconds: 12, runMa: 180 },
        switching: { kind: 'by-hand' },
      },
      {
        tag: 'A-4',
        load: { behaviour: 'holds', lowMa: 1, peakMa: 20, wave: 'rc-fade', onShare: 0.3, standbyMa: 0 },
      },
    ];
    for (const changes of others) await rig.ask.post('/api/props').send(aProp(site.id, changes)).expect(201);
    const first = await exported(rig, site.id);
    expect(await send(rig, site.id, first)).toMatchObject({ accepted: 6, unchanged: 6, notes: [] });
    expect(await exported(rig, site.id)).toBe(first);

    const second: string = (await rig.ask.post('/api/sites').send(A_SITE).expect(201)).body.id;
    expect(await send(rig, second, first)).toMatchObject({ rejected: [] });
    expect(await exported(rig, second)).toBe(first);
  });

  test('comes as a file with a byte order mark', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    for (const name of ['props', 'log', 'forecast']) {
      const answer = await rig.ask
        .get(`/api/sites/${site.id}/${name}.csv`)
        .buffer(true)
        .parse((response, done) => {
          const parts: Buffer[] = [];
          response.on('data', (part: Buffer) => parts.push(part));
          response.on('end', () => done(null, Buffer.concat(parts)));
        })
        .expect(200);
      expect(answer.headers['content-type']).toBe('text/csv; charset=utf-8');
      expect(answer.headers['content-disposition']).toBe(`attachment; filename="${name}.csv"`);
      // EF BB BF is UTF-8's mark; then the first heading.
      expect((answer.body as Buffer).subarray(0, 7).toString('latin1')).toBe('\xef\xbb\xbftag,');
      expect((answer.body as Buffer).subarray(-2).toString()).toBe('\r\n');
    }
  });

  test('the log has every entry that was not undone', async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    const swap = { at: '2026-10-20T16:30:00Z', state: 'new', cells: 3, note: '=sum, "quoted"' };
    await rig.ask.post(`/api/props/${prop.id}/swaps`).send(swap).expect(201);
    const seen = { at: '2026-10-22T00:40:00+01:00', seen: 'dim', volts: 3.2, taken: 'lit' };
    await rig.ask.post(`/api/props/${prop.id}/sightings`).send(seen).expect(201);
    const slip = await rig.ask
      .post(`/api/props/${prop.id}/sightings`)
      .send({ ...seen, seen: 'odd' })
      .expect(201);
    await rig.ask.delete(`/api/props/${prop.id}/log/${slip.body.id}`).expect(200);
    const [headings, ...rows] = (await rig.ask.get(`/api/sites/${site.id}/log.csv`).expect(200)).text
      .trim()
      .split('\r\n');
    expect(headings).toBe(
      'tag,name,zone,evening,at,kind,state,leftShare,cellTypeId,cells,setId,healthShare,oldSet,seen,volts,taken,note,recordedAt',
    );
    const recorded = '2026-10-22T09:00:00Z';
    const who = 'C-02,Moth lantern,Ferny Bank';
    expect(rows).toEqual([
      `${who},2026-10-20,2026-10-20T16:30:00Z,swap,new,,,3,,,,,,,"'=sum, ""quoted""",${recorded}`,
      // Twenty to one at night belongs to the evening before.
      `${who},2026-10-21,2026-10-21T23:40:00Z,sighting,,,,,,,,dim,3.2,lit,,${recorded}`,
    ]);
  });

  test('the forecast says what the forecast says', async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    const swap = { at: '2026-10-15T16:30:00Z', state: 'new' };
    await rig.ask.post(`/api/props/${prop.id}/swaps`).send(swap).expect(201);
    const asOf = '2026-10-20T09:00:00Z';
    const forecast = (await rig.ask.get(`/api/sites/${site.id}/forecast?asOf=${asOf}`).expect(200)).body;
    const { text } = await rig.ask.get(`/api/sites/${site.id}/forecast.csv?asOf=${asOf}`).expect(200);
    const [headings, row] = text.slice(text.startsWith('\ufeff') ? 1 : 0).split('\r\n');
    const cells = Object.fromEntries(
      headings!.split(',').map((name, index) => [name, row!.split(',')[index]]),
    );
    const [one] = forecast.props;
    expect(cells).toMatchObject({
      tag: one.tag,
      group: one.group,
      'dim.early': one.dim.early ?? '',
      'dark.late': one.dark.late ?? '',
      leftShare: String(one.leftShare),
      chanceBrightToNextRound: String(one.chanceBrightToNextRound),
      asOf,
    });
    await rig.ask.get(`/api/sites/${site.id}/forecast.csv?asOf=1066-10-14T09:00:00Z`).expect(400);
  });
});

describe('ten thousand rows', () => {
  const manyRows = (count: number) =>
    fileOf(...Array.from({ length: count }, (_, i) => rowOf({ tag: `B-${i}`, name: `Lantern ${i}` })));

  test('take per row hardly longer than a thousand', async () => {
    const msPerRow = async (count: number) => {
      const rig = await aRig();
      const site = (await aSiteWithProp(rig)).site;
      await rig.ask.delete(`/api/props/${(await propsOf(rig, site.id))[0]!.id}`).expect(204);
      const file = manyRows(count);
      const startedMs = performance.now();
      expect(await send(rig, site.id, file)).toMatchObject({ accepted: count, rejected: [] });
      return (performance.now() - startedMs) / count;
    };
    await msPerRow(200);
    const few = await msPerRow(1000);
    const many = await msPerRow(10_000);
    // Work that grows with the square of the rows would be ten times as long here.
    expect(many / few).toBeLessThan(4);
  });

  test('are the most one site holds', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const { accepted, rejected } = await send(rig, site.id, manyRows(10_000), true);
    expect(accepted).toBe(0);
    expect(rejected).toEqual([
      { row: 1, field: 'file', message: expect.stringContaining('10000 is the most') },
    ]);
  });

  test('all faulty are counted, and the first two thousand listed', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const rows = Array.from({ length: 2500 }, (_, i) => rowOf({ tag: `B-${i}`, dimVolts: 'x' }));
    const { rejected, unlisted } = await send(rig, site.id, fileOf(...rows), true);
    expect([rejected.length, unlisted]).toEqual([2000, 500]);
  });
});
