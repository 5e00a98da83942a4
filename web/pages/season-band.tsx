import type { Night, Site } from '../api/types.ts';
import { type BandNight, FROST_C, nightBand } from '../drawing/night-band.ts';
import { FitWidth } from '../parts/fit-width.tsx';
import { TableRoom } from '../parts/table-room.tsx';
import { WEATHER_WORDS } from '../words/names.ts';
import { counted, degrees, hours } from '../words/quantity.ts';
import { dateWords, wallTime } from '../words/time.ts';

/** The season's nights as one picture, and the same as a table. */
export function SeasonBand({
  nights,
  site,
  tonight,
}: {
  nights: Night[];
  site: Site;
  tonight: string | null;
}) {
  const band = nights.map((night) => bandNight(night, site.timeZone));
  const cold = nights.filter(({ minC }) => minC < FROST_C).length;
  const shows = nights.filter(({ showNight }) => showNight && !showNight.calledOff).length;
  const label = `${counted(nights.length, 'night')}, ${counted(shows, 'show night')}, ${counted(cold, 'cold night')}; the table has each.`;
  return (
    <section class="season-band" aria-labelledby="season-band-title">
      <h2 id="season-band-title">The season's nights</h2>
      <FitWidth draw={(width) => nightBand(band, { width, label, tonight })} />
      <ul class="key">
        <li>
          <span class="key-swatch key-dark" /> dusk to dawn
        </li>
        <li>
          <span class="key-swatch key-gate" /> gate open
        </li>
        <li>
          <span class="key-swatch key-off" /> called off
        </li>
        <li>
          <span class="key-cold">✱</span> below {degrees(FROST_C)}
        </li>
      </ul>
      <details>
        <summary>The same as a table</summary>
        <NightsTable nights={nights} timeZone={site.timeZone} />
      </details>
    </section>
  );
}

function bandNight(night: Night, timeZone: string): BandNight {
  const wall = (at: string | null) => (at === null ? null : wallTime(Date.parse(at), timeZone));
  const show = night.showNight;
  return {
    evening: night.evening,
    dusk: wall(night.duskAt),
    dawn: wall(night.dawnAt),
    sun: night.sun ?? null,
    gate: show
      ? { opensAt: show.opensAt, closesAt: show.closesAt, calledOff: show.calledOff ?? false }
      : null,
    minC: night.minC,
  };
}

function NightsTable({ nights, timeZone }: { nights: Night[]; timeZone: string }) {
  const wall = (at: string | null) => (at === null ? '–' : wallTime(Date.parse(at), timeZone));
  return (
    <TableRoom label="Nights of the season">
      <table>
        <thead>
          <tr>
            <th scope="col">Evening</th>
            <th scope="col">Dusk</th>
            <th scope="col">Dawn</th>
            <th scope="col">Dark</th>
            <th scope="col">Gate</th>
            <th scope="col">Lowest</th>
            <th scope="col">Mean</th>
            <th scope="col">Temperature from</th>
          </tr>
        </thead>
        <tbody>
          {nights.map((night) => (
            <tr key={night.evening}>
              <th scope="row">{dateWords(night.evening)}</th>
              <td>{wall(night.duskAt)}</td>
              <td>{wall(night.dawnAt)}</td>
              <td>
                {night.sun === 'never-dark'
                  ? 'never dark'
                  : night.sun === 'never-light'
                    ? 'never light'
                    : hours(night.darkHours)}
              </td>
              <td>
                {night.showNight ? `${night.showNight.opensAt} – ${night.showNight.closesAt}` : 'night off'}
                {night.showNight?.calledOff && ', called off'}
              </td>
              <td>{degrees(night.minC)}</td>
              <td>{degrees(night.meanC)}</td>
              <td>{WEATHER_WORDS[night.weather]}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </TableRoom>
  );
}
