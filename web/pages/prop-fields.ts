import type { Load, NewProp, Prop, PropChanges, Switching, Trips } from '../api/types.ts';
import type { Reader } from '../state/form.ts';
import { instantOfStamp, wallStamp } from '../words/time.ts';

export type Fields = Record<string, string>;

const text = (value: number | undefined) => (value === undefined ? '' : String(value));

/** A prop as typed text; without one, what an empty form starts from. Names are those of the request. */
export function fieldsOfProp(prop: Prop | null, timeZone: string): Fields {
  const load = prop?.load;
  return {
    tag: prop?.tag ?? '',
    name: prop?.name ?? '',
    zone: prop?.zone ?? '',
    units: String(prop?.units ?? 1),
    importance: prop?.importance ?? 'feature',
    cellTypeId: prop?.cellTypeId ?? 'LR6',
    series: String(prop?.series ?? 3),
    parallel: String(prop?.parallel ?? 1),
    dimVolts: text(prop?.dimVolts),
    stopVolts: text(prop?.stopVolts),
    xM: text(prop?.xM),
    yM: text(prop?.yM),
    offsetC: text(prop?.offsetC),
    measured: load && load.meanMa === undefined && load.lowMa !== undefined ? 'low-peak' : 'mean',
    'load.behaviour': load?.behaviour ?? 'fades',
    'load.meanMa': text(load?.meanMa),
    'load.lowMa': text(load?.lowMa),
    'load.peakMa': text(load?.peakMa),
    'load.wave': load?.wave ?? 'even-fade',
    'load.onShare': load?.onShare === undefined ? '' : text(Math.round(load.onShare * 1000) / 10),
    'load.standbyMa': text(load?.standbyMa),
    'load.measuredVolts': text(load?.measuredVolts),
    'load.ledVolts': text(load?.ledVolts),
    ...fieldsOfSwitching(prop?.switching ?? { kind: 'light-sensor' }, timeZone),
    ...fieldsOfTrips(prop?.trips),
  };
}

function fieldsOfSwitching(switching: Switching, timeZone: string): Fields {
  const sensor = switching.kind === 'light-sensor' ? switching : null;
  const clock = switching.kind === 'clock' ? switching : null;
  const timer = switching.kind === 'interval-timer' ? switching : null;
  return {
    'switching.kind': switching.kind,
    'switching.onLux': text(sensor?.onLux),
    'switching.onAltitudeDeg': text(sensor?.onAltitudeDeg),
    'switching.offLux': text(sensor?.offLux),
    'switching.offAltitudeDeg': text(sensor?.offAltitudeDeg),
    'switching.skyShare': sensor?.skyShare === undefined ? '' : text(Math.round(sensor.skyShare * 1000) / 10),
    'switching.cutOffHours': text(sensor?.cutOffHours),
    'switching.onAt': clock?.onAt ?? '18:00',
    'switching.offAt': clock?.offAt ?? '22:30',
    'switching.onHours': text(timer?.onHours) || '6',
    'switching.setAt': timer?.setAt ? wallStamp(Date.parse(timer.setAt), timeZone) : '',
  };
}

function fieldsOfTrips(trips: Trips | undefined): Fields {
  return {
    hasTrips: trips ? 'yes' : 'no',
    'trips.perShowNight': text(trips?.perShowNight),
    'trips.perNightOff': text(trips?.perNightOff) || '0',
    'trips.seconds': text(trips?.seconds),
    'trips.runMa': text(trips?.runMa),
  };
}

/** Leaves out what is not given, so that an absent field stays absent. */
function given<T extends object>(values: T): { [Name in keyof T]: Exclude<T[Name], undefined> } {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined)) as never;
}

const share = (read: Reader, field: string) => {
  const value = read.optionalNumber(field);
  return value === undefined ? undefined : value / 100;
};

function loadOf(read: Reader): Load {
  const isMean = read.text('measured') === 'mean';
  const hasTrips = read.text('hasTrips') === 'yes';
  // A prop that only runs when tripped may have no lit draw of its own.
  const mean = isMean
    ? hasTrips
      ? read.optionalNumber('load.meanMa')
      : read.number('load.meanMa')
    : undefined;
  const fade = isMean
    ? {}
    : {
        lowMa: read.number('load.lowMa'),
        peakMa: read.number('load.peakMa'),
        wave: read.text('load.wave') as NonNullable<Load['wave']>,
        onShare: share(read, 'load.onShare'),
      };
  return given({
    behaviour: read.text('load.behaviour') as Load['behaviour'],
    meanMa: mean,
    ...fade,
    standbyMa: read.optionalNumber('load.standbyMa') ?? 0,
    measuredVolts: read.optionalNumber('load.measuredVolts'),
    ledVolts: read.optionalNumber('load.ledVolts'),
  }) as Load;
}

function switchingOf(read: Reader, timeZone: string): Switching {
  const kind = read.text('switching.kind') as Switching['kind'];
  switch (kind) {
    case 'light-sensor':
      return given({
        kind,
        onLux: read.optionalNumber('switching.onLux'),
        onAltitudeDeg: read.optionalNumber('switching.onAltitudeDeg'),
        offLux: read.optionalNumber('switching.offLux'),
        offAltitudeDeg: read.optionalNumber('switching.offAltitudeDeg'),
        skyShare: share(read, 'switching.skyShare'),
        cutOffHours: read.optionalNumber('switching.cutOffHours'),
      }) as Switching;
    case 'clock':
      return { kind, onAt: read.text('switching.onAt'), offAt: read.text('switching.offAt') };
    case 'interval-timer': {
      const setAt = instantOfStamp(read.optionalText('switching.setAt') ?? '', timeZone);
      return given({
        kind,
        onHours: read.number('switching.onHours'),
        setAt: setAt === null ? undefined : new Date(setAt).toISOString(),
      }) as Switching;
    }
    default:
      return { kind };
  }
}

/** What the form says, as a request for a new prop. */
export function newPropOf(read: Reader, site: { id: string; timeZone: string }): NewProp {
  const hasTrips = read.text('hasTrips') === 'yes';
  return given({
    siteId: site.id,
    tag: read.text('tag'),
    name: read.text('name'),
    zone: read.text('zone'),
    units: read.number('units'),
    importance: read.text('importance') as Prop['importance'],
    cellTypeId: read.text('cellTypeId'),
    series: read.number('series'),
    parallel: read.number('parallel'),
    dimVolts: read.number('dimVolts'),
    stopVolts: read.optionalNumber('stopVolts'),
    load: loadOf(read),
    switching: switchingOf(read, site.timeZone),
    trips: hasTrips
      ? {
          perShowNight: read.number('trips.perShowNight'),
          perNightOff: read.number('trips.perNightOff'),
          seconds: read.number('trips.seconds'),
          runMa: read.number('trips.runMa'),
        }
      : undefined,
    xM: read.optionalNumber('xM'),
    yM: read.optionalNumber('yM'),
    offsetC: read.optionalNumber('offsetC'),
  }) as NewProp;
}

/** The same as changes: what was emptied is taken away. */
export function propChangesOf(read: Reader, site: { id: string; timeZone: string }): PropChanges {
  const { siteId: _, ...prop } = newPropOf(read, site);
  return { stopVolts: null, xM: null, yM: null, offsetC: null, trips: null, ...prop };
}
