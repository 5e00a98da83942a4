import type { ComponentChildren } from 'preact';
import type { Prop, PropForecast } from '../api/types.ts';
import { defaultWords } from '../words/names.ts';
import { degrees, figures, hours, ma, mah, percent } from '../words/quantity.ts';
import { rangeWords } from '../words/range.ts';
import { shortMomentWords } from '../words/time.ts';

type PropSumProps = { forecast: PropForecast; prop: Prop; tonight: string; timeZone: string };

/** The sum behind the date, step by step, so that it can be redone on paper and argued with. */
export function PropSum({ forecast, prop, tonight, timeZone }: PropSumProps) {
  const { why, usableMah, usedMah, drainFactor } = forecast;
  const isDefault = (name: string) =>
    why.defaults.some((field) => field === name || field.endsWith(`.${name}`));
  return (
    <section class="sum" aria-labelledby="sum-title">
      <h2 id="sum-title">Why this date</h2>
      {why.warnings.map((warning) => (
        <p key={warning.code} class="notice notice-warning">
          {warning.text}
        </p>
      ))}
      <ol class="steps">
        <Step title="It takes tonight" result={mah(why.mahTonight)}>
          {why.meanMa === null
            ? 'not lit by itself'
            : `${ma(why.meanMa)} lit for ${hours(why.litHoursTonight)}`}
          , and {ma(why.standbyMa)} while it waits
          {(isDefault('standbyMa') || isDefault('meanMa')) && (
            <>
              {' '}
              <Default />
            </>
          )}
          {prop.trips &&
            `, and ${mah(why.tripMahTonight)} for trips of ${prop.trips.seconds} s at ${ma(prop.trips.runMa)}`}
        </Step>
        <Step
          title="The set gives tonight, before it looks dim"
          result={usableMah === null ? 'not known' : mah(usableMah.tonight)}
        >
          {mah(why.capacityMah)} on the label
          <Factor value={why.cutOffShare} words={`down to ${figures(prop.dimVolts)} V`} />
          <Factor value={why.rateShare} words={`at ${ma(why.rateMa)}`} />
          <Factor value={why.coldShare} words={`at ${degrees(why.tonightC)}`} />
          <Factor value={why.weakestShare} words="for the weakest cell of the set" />
          <Factor value={why.healthShare} words="for the age of the set" />
          {usableMah !== null && (
            <span class="soft">. In a warm room it would be {mah(usableMah.at20C)}.</span>
          )}
        </Step>
        <Step title="Used since it was fitted" result={usedMah === null ? 'not known' : mah(usedMah)}>
          {forecast.fittedAt === null
            ? 'no swap on record'
            : `fitted ${shortMomentWords(Date.parse(forecast.fittedAt), timeZone)}${forecast.usedShare === null ? '' : `; that is ${percent(forecast.usedShare)} of what it gives`}`}
          {why.leftAtStartShare < 1 && `, with ${percent(1 - why.leftAtStartShare)} gone from it before`}
        </Step>
        <Step title="It drains at" result={`${drainFactor.likely.toFixed(2)} × the sum`}>
          between {drainFactor.low.toFixed(2)} and {drainFactor.high.toFixed(2)} times, most likely: from how
          the draw was measured and how much brands differ
        </Step>
        <Step title="So it looks dim" result={rangeWords(forecast.dim, tonight)}>
          {why.mahTonight > 0 && usableMah !== null && usedMah !== null
            ? `${mah(Math.max(0, usableMah.tonight - usedMah))} left at ${mah(why.mahTonight)} a night like tonight is ${figures(Math.max(0, usableMah.tonight - usedMah) / why.mahTonight, 2)} nights; the season's own nights and cold make the range`
            : 'the season’s own nights and cold make the range'}
        </Step>
      </ol>
      {why.defaults.length > 0 && (
        <p class="soft">
          Taken as usual, not measured: {why.defaults.map(defaultWords).join(', ')}. Measure them and the
          range narrows.
        </p>
      )}
    </section>
  );
}

function Step({ title, result, children }: { title: string; result: string; children: ComponentChildren }) {
  return (
    <li>
      <h3>{title}</h3>
      <strong class="step-result">{result}</strong>
      <p>{children}</p>
    </li>
  );
}

/** One factor of the sum; one that changes nothing stays out of the way. */
function Factor({ value, words }: { value: number; words: string }) {
  if (Math.abs(value - 1) < 0.005) return null;
  return (
    <>
      {' '}
      × {figures(value, 2)} <span class="soft">{words}</span>
    </>
  );
}

const Default = () => <span class="badge">usual, not measured</span>;
