import type { LogEntry, PropForecast } from '../api/types.ts';
import { type SeasonNight, type SeasonValues, seasonWick } from '../drawing/season-wick.ts';
import { FitWidth } from '../parts/fit-width.tsx';
import { TableRoom } from '../parts/table-room.tsx';
import { entryWords, NIGHT_WORDS, WEATHER_WORDS } from '../words/names.ts';
import { chanceWords, degrees, hours, mah, percent } from '../words/quantity.ts';
import { dimWords } from '../words/range.ts';
import { dateWords, eveningOf } from '../words/time.ts';

type PropSeasonProps = {
  forecast: PropForecast;
  entries: LogEntry[];
  timeZone: string;
  tonight: string;
  nextRound: string | null;
};

/** The prop's wick through the season, and its nights as a table. */
export function PropSeason({ forecast, entries, timeZone, tonight, nextRound }: PropSeasonProps) {
  const values = seasonValues({ forecast, entries, timeZone, tonight, nextRound });
  const label = `Wick through the season: ${dimWords(forecast.dim, tonight)}. The table of nights has every number.`;
  return (
    <section class="season-section" aria-labelledby="season-title">
      <h2 id="season-title">Through the season</h2>
      <FitWidth draw={(width) => seasonWick(values, { width, label })} />
      <ul class="key">
        <li>
          <span class="key-swatch key-strands" /> bright: the thicker, the surer
        </li>
        <li>
          <span class="key-swatch key-hatched" /> looks dim
        </li>
        <li>
          <span class="key-swatch key-open" /> dark
        </li>
        <li>◆ swap</li>
        <li>● seen bright</li>
        <li>◒ dim</li>
        <li>○ dark</li>
        <li>✱ cold</li>
      </ul>
      {forecast.nights.length > 0 && (
        <details>
          <summary>The nights as a table</summary>
          <PropNights forecast={forecast} tonight={tonight} />
        </details>
      )}
    </section>
  );
}

function seasonValues({ forecast, entries, timeZone, tonight, nextRound }: PropSeasonProps): SeasonValues {
  const nights = forecast.nights.map(
    (night): SeasonNight => ({
      evening: night.evening,
      litHours: night.litHours,
      leftShare: night.usableMah > 0 ? Math.min(1, Math.max(0, 1 - night.usedMah / night.usableMah)) : 0,
      chanceBright: night.chanceBright,
      chanceLit: night.chanceLit,
      likely: night.likely,
      meanC: night.meanC,
      showNight: night.showNight,
    }),
  );
  const marks = entries.map((entry) => ({
    evening: eveningOf(Date.parse(entry.at), timeZone),
    mark: entry.kind === 'swap' ? ('swap' as const) : entry.seen,
    text: `${dateWords(eveningOf(Date.parse(entry.at), timeZone))}: ${entryWords(entry)}`,
  }));
  return { nights, marks, tonight, nextRound, swapBy: forecast.swapBy };
}

function PropNights({ forecast, tonight }: { forecast: PropForecast; tonight: string }) {
  return (
    <TableRoom label="Nights of this prop">
      <table>
        <thead>
          <tr>
            <th scope="col">Evening</th>
            <th scope="col">Likely</th>
            <th scope="col">Bright so far</th>
            <th scope="col">Lit that night</th>
            <th scope="col">Lit hours</th>
            <th scope="col">Used</th>
            <th scope="col">Holds</th>
            <th scope="col">Used share</th>
            <th scope="col">Mean</th>
            <th scope="col">Temperature from</th>
          </tr>
        </thead>
        <tbody>
          {forecast.nights.map((night) => (
            <tr key={night.evening} class={night.evening === tonight ? 'now' : undefined}>
              <th scope="row">
                {dateWords(night.evening)}
                {night.showNight && <span class="soft"> show</span>}
              </th>
              <td>{NIGHT_WORDS[night.likely]}</td>
              <td>{chanceWords(night.chanceBright)}</td>
              <td>{chanceWords(night.chanceLit)}</td>
              <td>{hours(night.litHours)}</td>
              <td>{mah(night.usedMah)}</td>
              <td>{mah(night.usableMah)}</td>
              <td>{night.usableMah > 0 ? percent(night.usedMah / night.usableMah) : '–'}</td>
              <td>{degrees(night.meanC)}</td>
              <td>{WEATHER_WORDS[night.weather]}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </TableRoom>
  );
}
