// The temperature of every hour of a season, each from the best that is known of it, with its spread.

import { check } from './check.ts';
import { type Climate, climateNightSigmaC, climateOffsetSigmaC, climateTemperatureC } from './climate.ts';
import {
  DAY_MS,
  type Evening,
  eveningSpan,
  eveningsBetween,
  eveningsFrom,
  HOUR_MS,
  type Instant,
} from './evening.ts';
import { darkSpell, type Place, SUNSET_ALTITUDE_DEG } from './sun.ts';

export type WeatherSource = 'observed' | 'forecast' | 'climate';

/** The low and the high of the dark hours of one night, °C, as somebody typed them. */
export type TypedNight = { minC: number; maxC: number };

/** Hourly air temperatures, one for each whole UTC hour from `startAt` on, °C; NaN = missing. */
export type ObservedHours = { startAt: Instant; tempC: Float32Array };

/** One evening's weather. `samplesC[k]` is the air k hours after `startAt`, up to the evening's end or just past it. */
export type EveningWeather = {
  evening: Evening;
  startAt: Instant;
  source: WeatherSource;
  /** Mean over sunset to sunrise; over the whole evening where the sun does not set or does not rise. */
  meanC: number;
  /** Lowest over the same stretch. */
  minC: number;
  /** 1 sd of what that mean may turn out to be about `meanC`, K. */
  sigmaC: number;
  samplesC: Float64Array;
};

/** Prepared by `seasonWeather`; ask it with `eveningWeather` and `temperatureC`. */
export type SeasonWeather = {
  from: Evening;
  startsAt: Float64Array;
  endAt: Instant;
  evenings: EveningWeather[];
};

/** Missing hours in a row that still count as known once bridged. Common practice, no source. */
const SHORT_GAP_HOURS = 3;
/** An evening counts as known from this many known hours on. Ours. */
const KNOWN_HOURS = 18;
/** How much of one night's departure from the climate is left a day later. Source: 60 stations, lag-1 0.57 sd 0.06. */
const DAILY_PERSISTENCE = 0.6;
/** How far a thermometer some kilometres away sits from the site, 1 sd of a night mean, K. From memory of 0.5-1. */
const STATION_SIGMA_C = climateOffsetSigmaC;
/** How far a typed night may be off, 1 sd of its mean, K. Ours: numbers are typed as whole degrees. */
const TYPED_SIGMA_C = 0.5;
/** A climate night flatter than this has no shape to scale, K. */
const FLAT_C = 0.1;
/** Hours outside the season that may still bridge a gap inside it. */
const EDGE_HOURS = 240;

/** Trust in a forecast 1..12 days ahead; nothing beyond. */
const FORECAST_TRUST = [0.95, 0.92, 0.88, 0.83, 0.76, 0.67, 0.58, 0.48, 0.39, 0.3, 0.22, 0.15];

/**
 * Correlation of a forecast night mean with what happens, both taken from the climate: 0..1.
 * Source: a judgement between two anchors: 12-24 h forecasts off by 2.1-2.5 K RMSE (US, 1990s), no skill beyond
 * about 12 days (Monthly Weather Review 122, 1994).
 * @param leadDays 1 = the coming night; 0 from 13 on
 */
export function forecastTrust(leadDays: number): number {
  return FORECAST_TRUST[Math.max(1, Math.ceil(leadDays)) - 1] ?? 0;
}

/**
 * The weather of a run of evenings. A typed night beats imported hours, hours beat the climate.
 *
 * Imported hours up to `asOf` are observed and taken as they are; later ones are a forecast and taken as the
 * climate plus `forecastTrust` of their departure from it. Missing hours between known ones take the climate plus
 * what persistence leaves of the departures on both sides; up to 3 in a row count as known. An evening with
 * 18 known hours is 'observed' once its dawn has passed, else 'forecast' up to 12 days ahead, else 'climate'.
 *
 * Sources: forecast blending with the `forecastTrust` table; the bridge is the mean of a first-order
 * autoregression between two known ends. Ours: the shape of typed nights, see `typedSamples`.
 * @param options.from first evening; `through` last one, at most 800 later
 * @param options.asOf the instant the weather is looked at from
 * @throws ProgrammerError when `through` lies before `from` or a typed night has its high below its low
 */
export function seasonWeather(options: {
  place: Place;
  climate: Climate;
  hours: ObservedHours | null;
  typedNights: ReadonlyMap<Evening, TypedNight>;
  from: Evening;
  through: Evening;
  asOf: Instant;
}): SeasonWeather {
  const { place, climate, hours, typedNights, from, through, asOf } = options;
  const names = eveningsFrom(from, through);
  check(names.length > 0, `a season runs forward, not from ${from} to ${through}`);
  const startsAt = new Float64Array(names.length);
  const spans = names.map((evening) => eveningSpan(evening, place.timeZone));
  const endAt = spans[spans.length - 1]!.endAt;
  const departures = hours && departuresWithin({ hours, climate, fromAt: spans[0]!.startAt, untilAt: endAt });

  const evenings = names.map((evening, index) => {
    const span = spans[index]!;
    startsAt[index] = span.startAt;
    const night = nightOf(evening, { span, place });
    const climateC = climateSamples(climate, span);
    const outlook = {
      night,
      isPast: night.untilAt <= asOf,
      trust: forecastTrust((span.startAt + DAY_MS / 2 - asOf) / DAY_MS),
      sigmaC: climateNightSigmaC(climate, evening),
      asOf,
    };
    const typed = typedNights.get(evening);
    const told = typed
      ? fromTyped(typed, { climateC, startAt: span.startAt, outlook })
      : fromHours(departures, { climateC, span, outlook });
    return {
      evening,
      startAt: span.startAt,
      ...told,
      ...nightFigures(told.samplesC, { startAt: span.startAt, night }),
    };
  });
  return { from, startsAt, endAt, evenings };
}

type Span = { startAt: Instant; endAt: Instant };
type Night = { fromAt: Instant; untilAt: Instant };
type Outlook = { night: Night; isPast: boolean; trust: number; sigmaC: number; asOf: Instant };
type Told = { source: WeatherSource; sigmaC: number; samplesC: Float64Array };

/** Sunset to sunrise; a side the sun does not cross is the evening's own end. */
function nightOf(evening: Evening, { span, place }: { span: Span; place: Place }): Night {
  const { duskAt, dawnAt } = darkSpell(evening, place, SUNSET_ALTITUDE_DEG);
  const fromAt = Math.max(span.startAt, duskAt ?? span.startAt);
  const untilAt = Math.min(span.endAt, dawnAt ?? span.endAt);
  return untilAt > fromAt ? { fromAt, untilAt } : { fromAt: span.startAt, untilAt: span.endAt };
}

function climateSamples(climate: Climate, { startAt, endAt }: Span): Float64Array {
  const samples = new Float64Array(Math.ceil((endAt - startAt) / HOUR_MS) + 1);
  for (let hour = 0; hour < samples.length; hour++) {
    samples[hour] = climateTemperatureC(climate, startAt + hour * HOUR_MS);
  }
  return samples;
}

/** Hourly departures of imported hours from the climate, K, gaps bridged; `known` leaves out the long gaps. */
type Departures = { startAt: Instant; departureC: Float64Array; known: Uint8Array };

function departuresWithin(options: {
  hours: ObservedHours;
  climate: Climate;
  fromAt: Instant;
  untilAt: Instant;
}): Departures {
  const { hours, climate, fromAt, untilAt } = options;
  const first = Math.max(0, Math.floor((fromAt - hours.startAt) / HOUR_MS) - EDGE_HOURS);
  const last = Math.min(hours.tempC.length - 1, Math.ceil((untilAt - hours.startAt) / HOUR_MS) + EDGE_HOURS);
  const count = Math.max(0, last - first + 1);
  const startAt = hours.startAt + first * HOUR_MS;
  const departureC = new Float64Array(count);
  const known = new Uint8Array(count);
  let lastKnown = -1;
  for (let index = 0; index < count; index++) {
    const tempC = hours.tempC[first + index]!;
    if (Number.isNaN(tempC)) continue;
    departureC[index] = tempC - climateTemperatureC(climate, startAt + index * HOUR_MS);
    known[index] = 1;
    if (lastKnown >= 0) bridge({ departureC, known, left: lastKnown, right: index });
    lastKnown = index;
  }
  return { startAt, departureC, known };
}

function bridge(options: { departureC: Float64Array; known: Uint8Array; left: number; right: number }): void {
  const { departureC, known, left, right } = options;
  const kept = (hours: number) => DAILY_PERSISTENCE ** (hours / 24);
  const whole = 1 - kept(right - left) ** 2;
  for (let index = left + 1; index < right; index++) {
    const toLeft = kept(index - left);
    const toRight = kept(right - index);
    const sum =
      toLeft * (1 - toRight ** 2) * departureC[left]! + toRight * (1 - toLeft ** 2) * departureC[right]!;
    departureC[index] = sum / whole;
    if (right - left - 1 <= SHORT_GAP_HOURS) known[index] = 1;
  }
}

function fromHours(
  departures: Departures | null,
  { climateC, span, outlook }: { climateC: Float64Array; span: Span; outlook: Outlook },
): Told {
  const climateOnly: Told = {
    source: 'climate',
    sigmaC: Math.hypot(outlook.sigmaC, climateOffsetSigmaC),
    samplesC: climateC,
  };
  if (!departures) return climateOnly;
  const samplesC = climateC.slice();
  let knownHours = 0;
  for (let hour = 0; hour < samplesC.length; hour++) {
    const at = span.startAt + hour * HOUR_MS;
    const position = (at - departures.startAt) / HOUR_MS;
    const left = Math.floor(position);
    const right = Math.ceil(position);
    if (left < 0 || right >= departures.departureC.length) continue;
    const share = position - left;
    const departureC = departures.departureC[left]! * (1 - share) + departures.departureC[right]! * share;
    samplesC[hour] = samplesC[hour]! + departureC * (at <= outlook.asOf ? 1 : outlook.trust);
    if (at < span.endAt && departures.known[left] && departures.known[right]) knownHours++;
  }
  if (knownHours < KNOWN_HOURS) return { ...climateOnly, samplesC };
  if (outlook.isPast) return { source: 'observed', sigmaC: STATION_SIGMA_C, samplesC };
  if (outlook.trust === 0) return climateOnly;
  return { source: 'forecast', sigmaC: forecastSigma(outlook, STATION_SIGMA_C), samplesC };
}

function fromTyped(
  typed: TypedNight,
  { climateC, startAt, outlook }: { climateC: Float64Array; startAt: Instant; outlook: Outlook },
): Told {
  return {
    source: outlook.isPast ? 'observed' : 'forecast',
    sigmaC: outlook.isPast ? TYPED_SIGMA_C : forecastSigma(outlook, TYPED_SIGMA_C),
    samplesC: typedSamples(typed, { climateC, startAt, night: outlook.night }),
  };
}

/** What the forecast leaves open, and how far its thermometer is off even where the forecast is right. */
function forecastSigma({ sigmaC, trust }: Outlook, ownSigmaC: number): number {
  return Math.hypot(sigmaC * Math.sqrt(1 - trust ** 2), ownSigmaC);
}

/**
 * Hours of a typed night. Ours: from sunset to sunrise the climate's own course, stretched so that its lowest hour is
 * the typed low and its highest hour the typed high (a cosine falling from sunset to sunrise where the climate is
 * flat). The hours of daylight keep the climate's own range and are only moved to join at sunset and at sunrise:
 * stretching them too would make a wildly warm noon out of a night somebody typed as very uneven.
 */
function typedSamples(
  typed: TypedNight,
  { climateC, startAt, night }: { climateC: Float64Array; startAt: Instant; night: Night },
): Float64Array {
  check(
    typed.maxC >= typed.minC,
    `a typed night's high ${typed.maxC} °C lies below its low ${typed.minC} °C`,
  );
  const last = climateC.length - 1;
  let dusk = Math.ceil((night.fromAt - startAt) / HOUR_MS);
  let dawn = Math.min(last, Math.floor((night.untilAt - startAt) / HOUR_MS));
  if (dawn <= dusk) [dusk, dawn] = [0, last];

  const nightC = climateC.subarray(dusk, dawn + 1);
  const lowC = Math.min(...nightC);
  const rangeC = Math.max(...nightC) - lowC;
  const typedRangeC = typed.maxC - typed.minC;
  const samplesC = climateC.slice();
  for (let hour = dusk; hour <= dawn; hour++) {
    const height =
      rangeC < FLAT_C
        ? (1 + Math.cos((Math.PI * (hour - dusk)) / (dawn - dusk))) / 2
        : (climateC[hour]! - lowC) / rangeC;
    samplesC[hour] = typed.minC + typedRangeC * height;
  }
  const duskMoveC = samplesC[dusk]! - climateC[dusk]!;
  const dawnMoveC = samplesC[dawn]! - climateC[dawn]!;
  for (let hour = 0; hour < dusk; hour++) samplesC[hour] = climateC[hour]! + duskMoveC;
  for (let hour = dawn + 1; hour <= last; hour++) samplesC[hour] = climateC[hour]! + dawnMoveC;
  return samplesC;
}

/** Mean and lowest of the straight lines between hourly samples over the night. */
function nightFigures(
  samplesC: Float64Array,
  { startAt, night }: { startAt: Instant; night: Night },
): { meanC: number; minC: number } {
  const from = (night.fromAt - startAt) / HOUR_MS;
  const until = (night.untilAt - startAt) / HOUR_MS;
  let position = from;
  let leftC = sampleAt(samplesC, from);
  let minC = leftC;
  let area = 0;
  while (position < until) {
    const next = Math.min(until, Math.floor(position) + 1);
    const rightC = sampleAt(samplesC, next);
    area += ((leftC + rightC) / 2) * (next - position);
    if (rightC < minC) minC = rightC;
    position = next;
    leftC = rightC;
  }
  return { meanC: until > from ? area / (until - from) : leftC, minC };
}

function sampleAt(samplesC: Float64Array, position: number): number {
  const left = Math.max(0, Math.min(Math.floor(position), samplesC.length - 2));
  const leftC = samplesC[left]!;
  return samplesC.length === 1 ? leftC : leftC + (samplesC[left + 1]! - leftC) * (position - left);
}

/**
 * One evening's weather: where it comes from, its night's mean, lowest and spread, and its hourly samples.
 * @param season from `seasonWeather`
 * @throws ProgrammerError for an evening outside the season
 */
export function eveningWeather(season: SeasonWeather, evening: Evening): EveningWeather {
  const found = season.evenings[eveningsBetween(season.from, evening)];
  check(found, `${evening} lies outside the season that starts on ${season.from}`);
  return found;
}

/**
 * Air temperature at an instant, °C, on the straight line between hourly samples.
 * Neighbouring evenings may meet at noon with a step, where one of them is typed or forecast.
 * @param season from `seasonWeather`
 * @param at within the season's evenings
 * @throws ProgrammerError for an instant outside them
 */
export function temperatureC(season: SeasonWeather, at: Instant): number {
  const { startsAt, evenings } = season;
  const firstAt = startsAt[0]!;
  if (!(at >= firstAt && at <= season.endAt))
    check(false, `instant ${at} lies outside the season of the weather`);
  let index = Math.min(evenings.length - 1, Math.floor((at - firstAt) / DAY_MS));
  while (startsAt[index]! > at) index--;
  while (index + 1 < evenings.length && startsAt[index + 1]! <= at) index++;
  return sampleAt(evenings[index]!.samplesC, (at - startsAt[index]!) / HOUR_MS);
}
