import { forecastSite } from '../../server/actions/forecast-site.ts';
import { buildApp } from '../../server/app.ts';
import { settableClock } from '../../server/clock.ts';
import type { CellType } from '../../server/model/cell-type.ts';
import { builtInCellType } from '../../server/model/cell-types-built-in.ts';
import { EIGHTY_PERCENT_Z } from '../../server/model/chance.ts';
import { instantInEvening } from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';
import { type PropProjection, projectProp } from '../../server/model/prop-forecast.ts';
import { insertEntry } from '../../server/store/log.ts';
import { openStore, type Store } from '../../server/store/open.ts';
import { insertProp } from '../../server/store/props.ts';
import { insertSite, raiseRevision } from '../../server/store/sites.ts';
import { aSeason, CLIMATE, freshSet, manyProps, PLACE } from '../rig/many-props.ts';
import { plainQuestion } from '../rig/plainly.ts';
import { stepHourByHour } from './hour-by-hour.ts';
import { requestsPerSecond } from './load.ts';

const FROM = '2026-10-10';
const THROUGH = '2027-02-06';
const fittedAt = instantInEvening(FROM, '15:00', PLACE.timeZone);

function siteWith(count: number): Store {
  const store = openStore(':memory:');
  store.transact((db) => {
    insertSite(db, {
      id: 'site',
      name: 'Bench',
      ...PLACE,
      seasonFrom: FROM,
      seasonThrough: THROUGH,
      monthlyMinC: CLIMATE.monthlyMinC,
      monthlyMaxC: CLIMATE.monthlyMaxC,
      confidence: 0.9,
      marginNights: 1,
      rounds: {
        weekdays: [3, 6],
        startsAt: '14:00',
        minutesFree: 90,
        minutesPerStop: 3,
        walkMinutes: 25,
        cost: 10,
      },
      zoneOffsetsC: {},
    });
    for (const prop of manyProps(count)) {
      insertProp(db, prop);
      for (const entry of freshSet(prop, fittedAt)) insertEntry(db, entry);
    }
    raiseRevision(db, 'site', fittedAt);
  });
  return store;
}

const depsOf = (store: Store) => ({
  store,
  clock: settableClock(fittedAt + 3_600_000),
  newId: () => 'x',
  newSecret: () => 'x',
});

function median(values: number[]): number {
  return [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]!;
}

function timesMs(rounds: number, work: (round: number) => void): number[] {
  return Array.from({ length: rounds }, (_, round) => {
    const begin = performance.now();
    work(round);
    return performance.now() - begin;
  });
}

function project(props: readonly Prop[], season: ReturnType<typeof aSeason>): PropProjection[] {
  const shelf = new Map();
  const cellTypeOf = (id: string): CellType | null => builtInCellType(id);
  return props.map((prop) => {
    const log = freshSet(prop, fittedAt);
    return projectProp({
      prop,
      log,
      cellTypeOf,
      zoneOffsetC: 0,
      season,
      asOf: fittedAt,
      shelf,
      wholeSeason: true,
    }) as PropProjection;
  });
}

/** A range wants the plain sum three times: at the likely draw and at both ends of four times in five. */
const RANGE_ENDS = [-1, 0, 1];

function againstPlain(): void {
  const props = manyProps(500);
  const season = aSeason(FROM, THROUGH);
  const store = siteWith(500);
  const deps = depsOf(store);
  const ours = timesMs(15, () => forecastSite(deps, { siteId: 'site', asOf: fittedAt }));
  const projections = project(props, season);
  const apart: number[] = [];
  const passesMs = RANGE_ENDS.map((end) => {
    const begin = performance.now();
    props.forEach((prop, i) => {
      const projection = projections[i]!;
      const factor = Math.exp(EIGHTY_PERCENT_Z * projection.belief.spread * end);
      const plain = stepHourByHour(plainQuestion({ prop, season, fittedAt, projection }, factor));
      if (end === 0) apart.push(nightsApart(projection, plain.dimAfterNights));
    });
    return performance.now() - begin;
  });
  store.close();
  const oursMs = median(ours.slice(4));
  const rangeMs = passesMs.reduce((sum, ms) => sum + ms, 0);
  console.log(
    `site forecast, 500 props × 120 nights, database included: ${oursMs.toFixed(0)} ms (first of the process ${ours[0]!.toFixed(0)} ms)\n` +
      `  a plain hour-by-hour sum of the same 80 % ranges: ${(rangeMs / 1000).toFixed(1)} s, ${(rangeMs / oursMs).toFixed(0)} times as long; ` +
      `of the likely dates alone: ${(passesMs[1]! / oursMs).toFixed(0)} times\n` +
      `  first dim moments apart: median ${median(apart).toFixed(3)} nights, ${apart.filter((nights) => nights > 0.1).length} of 500 by more than 0.1 (spared by a hair at dawn)`,
  );
}

function nightsApart({ depletion }: PropProjection, plainNights: number | null): number {
  const dimNight = depletion.brightBelow.findIndex((threshold) => threshold < 1);
  if (dimNight === -1 || plainNights === null) return dimNight === -1 && plainNights === null ? 0 : 1;
  return Math.abs(dimNight + depletion.brightShare[dimNight]! - plainNights);
}

function manyPropsMemory(): void {
  const store = siteWith(10_000);
  const deps = depsOf(store);
  const [first, second] = timesMs(2, () => forecastSite(deps, { siteId: 'site', asOf: fittedAt }));
  const residentMb = process.resourceUsage().maxRSS / 1024;
  store.close();
  console.log(
    `site forecast, 10,000 props × 120 nights: ${(first! / 1000).toFixed(2)} s, again ${(second! / 1000).toFixed(2)} s; ` +
      `largest resident memory of this process ${residentMb.toFixed(0)} MB`,
  );
}

async function overHttp(): Promise<void> {
  const store = siteWith(50);
  const clock = settableClock(fittedAt + 3_600_000);
  const app = buildApp({ store, clock });
  const path = '/api/sites/site/forecast';
  const size = (await app.inject({ url: path, headers: { host: '127.0.0.1' } })).body.length;
  const constant = JSON.stringify({ constant: 'x'.repeat(size - 15) });
  const floor = (await import('fastify')).default();
  floor.get('/constant', (_, reply) =>
    reply
      .type('application/json; charset=utf-8')
      .serializer((text: string) => text)
      .send(constant),
  );
  const reads: number[] = [];
  for (let round = 0; round < 30; round += 1) {
    raiseRevision(store.db, 'site', clock.now());
    const begin = performance.now();
    await app.inject({ url: path, headers: { host: '127.0.0.1' } });
    reads.push(performance.now() - begin);
  }
  console.log(
    `first read of a changed 50-prop site's forecast over HTTP: median ${median(reads.slice(10)).toFixed(1)} ms, first of all ${reads[0]!.toFixed(1)} ms`,
  );
  const [ours, floorAt] = [
    await app.listen({ port: 0, host: '127.0.0.1' }),
    await floor.listen({ port: 0, host: '127.0.0.1' }),
  ];
  const answer = await fetch(`${ours}${path}`);
  const etag = answer.headers.get('etag')!;
  const rates = { constant: [] as number[], unchanged: [] as number[], whole: [] as number[] };
  for (let round = 0; round < 5; round += 1) {
    rates.constant.push(await requestsPerSecond(`${floorAt}/constant`, {}));
    rates.unchanged.push(await requestsPerSecond(`${ours}${path}`, { 'if-none-match': etag }));
    rates.whole.push(await requestsPerSecond(`${ours}${path}`, {}));
  }
  const [floorRate, unchanged, whole] = [
    median(rates.constant),
    median(rates.unchanged),
    median(rates.whole),
  ];
  console.log(
    `unchanged read again, ${(size / 1024).toFixed(0)} kB: with its ETag ${(unchanged / floorRate).toFixed(2)} ×, whole ${(whole / floorRate).toFixed(2)} × ` +
      `the requests per second of a route that does nothing but send the same number of bytes`,
  );
  await app.close();
  await floor.close();
  store.close();
}

/** The site forecast: against the plain sum, with many props, and over HTTP against a constant. */
export async function benchForecast(): Promise<void> {
  againstPlain();
  await overHttp();
  manyPropsMemory();
}
