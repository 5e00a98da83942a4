import type { ComponentChildren } from 'preact';
import { api } from '../api/client.ts';
import type { Night, Site, SiteForecast, SiteForecastProp } from '../api/types.ts';
import { sign } from '../drawing/sign.ts';
import { DayStepper } from '../parts/day-stepper.tsx';
import { Link } from '../parts/link.tsx';
import { Trouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { GROUP_WORDS, GROUPS, type Group } from '../words/names.ts';
import { counted, degrees, hours } from '../words/quantity.ts';
import { dateWords, wallTime } from '../words/time.ts';
import { PropRow, WickKey } from './prop-row.tsx';
import { SeasonBand } from './season-band.tsx';

/** What goes dim before anybody can get there. */
export function TonightPage({ site }: { site: Site }) {
  const { asOf, place, health, tonight } = useShell();
  const forecast = useRead(`forecast ${site.id} ${asOf}`, () => api.siteForecast(site.id, asOf));
  const nights = useRead(`nights ${site.id} ${asOf}`, () => api.nights(site.id, asOf));
  const isRunning = health?.asOf === null && place.asOf === null;

  return (
    <div class="tonight" aria-busy={forecast.loading}>
      <PageHead title={`Tonight, ${dateWords(tonight)}`}>
        {isRunning && (
          <details class="another-day">
            <summary>Look at another day</summary>
            <DayStepper timeZone={site.timeZone} />
          </details>
        )}
      </PageHead>
      {forecast.problem && <Trouble problem={forecast.problem} onAgain={() => void forecast.again()} />}
      {!forecast.value && !forecast.problem && <Waiting what="tonight's answer" />}
      {forecast.value && <Answer forecast={forecast.value} />}
      <TonightFacts
        site={site}
        evening={tonight}
        nights={nights.value}
        nextRound={forecast.value?.nextRound ?? null}
      />
      {forecast.value && <Groups forecast={forecast.value} tonight={tonight} />}
      {nights.value && <SeasonBand nights={nights.value} site={site} tonight={tonight} />}
    </div>
  );
}

const FOLDED_ABOVE = 8;

const ofGroup = (props: SiteForecastProp[], group: Group) => props.filter((prop) => prop.group === group);

function Answer({ forecast }: { forecast: SiteForecast }) {
  const { props, nextRound } = forecast;
  if (props.length === 0) {
    return (
      <div class="empty">
        <p class="lead">No props yet.</p>
        <p>Add the first one and record when its cells went in; the answer starts from there.</p>
        <Link path="/props/new" class="button">
          Add a prop
        </Link>
      </div>
    );
  }
  const risky = ofGroup(props, 'at-risk').length;
  const when =
    nextRound === null ? 'before a round is planned' : `before the round on ${dateWords(nextRound)}`;
  return (
    <>
      <p class="lead">
        {risky === 0
          ? `Nothing is likely to look dim ${when}.`
          : `${counted(risky, 'prop')} may look dim ${when}.`}
      </p>
      <ul class="tally">
        {GROUPS.map((group) => (
          <li key={group} class={`tally-${group}`}>
            <a href={`#${group}`}>
              {sign(group)}
              <span class="tally-count">{ofGroup(props, group).length}</span>
              <span class="tally-word">{GROUP_WORDS[group].short}</span>
            </a>
          </li>
        ))}
      </ul>
    </>
  );
}

type FactsProps = { site: Site; evening: string; nights: Night[] | null; nextRound: string | null };

/** Dusk to dawn, cold, gate and the next round, in the site's own time. */
function TonightFacts({ site, evening, nights, nextRound }: FactsProps) {
  const night = nights?.find((one) => one.evening === evening) ?? null;
  return (
    <dl class="facts">
      {night && (
        <>
          <Fact name="Dark" value={darkWords(night, site.timeZone)} more={hours(night.darkHours)} />
          <Fact name="Cold" value={`down to ${degrees(night.minC)}`} more={weatherWords(night)} />
          <Fact name="Gate" value={gateWords(night)} />
        </>
      )}
      <Fact
        name="Next round"
        value={nextRound === null ? 'none planned' : dateWords(nextRound)}
        {...(nextRound === null ? {} : { more: `usually ${site.rounds.startsAt}` })}
      />
    </dl>
  );
}

function Fact({ name, value, more }: { name: string; value: string; more?: string }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>
        {value}
        {more && <span class="fact-more">{more}</span>}
      </dd>
    </div>
  );
}

function darkWords(night: Night, timeZone: string): string {
  if (night.sun === 'never-dark') return 'never gets dark';
  if (night.sun === 'never-light') return 'never gets light';
  const wall = (at: string | null) => (at === null ? '…' : wallTime(Date.parse(at), timeZone));
  return `${wall(night.duskAt)} – ${wall(night.dawnAt)}`;
}

const weatherWords = (night: Night) =>
  night.weather === 'climate'
    ? 'usual for the month'
    : night.weather === 'observed'
      ? 'as observed'
      : 'as forecast';

function gateWords(night: Night): string {
  if (!night.showNight) return 'night off';
  if (night.showNight.calledOff) return 'called off';
  return `${night.showNight.opensAt} – ${night.showNight.closesAt}`;
}

function Groups({ forecast, tonight }: { forecast: SiteForecast; tonight: string }) {
  if (forecast.props.length === 0) return null;
  return (
    <>
      <WickKey />
      {GROUPS.map((group) => {
        const props = ofGroup(forecast.props, group).toSorted(byUrgency);
        if (props.length === 0) return null;
        const shared = sharedNote(props);
        return (
          <section key={group} id={group} class={`group group-${group}`} aria-labelledby={`${group}-title`}>
            <h2 id={`${group}-title`}>
              {sign(group)} {GROUP_WORDS[group].title} <span class="group-count">{props.length}</span>
            </h2>
            <p class="soft">{shared ?? GROUP_WORDS[group].about}</p>
            <Foldable count={group === 'fine' ? props.length : 0}>
              <ul class="rows">
                {props.map((prop) => (
                  <PropRow
                    key={prop.propId}
                    prop={prop}
                    tonight={tonight}
                    nextRound={forecast.nextRound}
                    saidAbove={shared}
                  />
                ))}
              </ul>
            </Foldable>
          </section>
        );
      })}
    </>
  );
}

/** A note that most of a group share is said once, above them. */
function sharedNote(props: SiteForecastProp[]): string | null {
  const note = props[0]?.note ?? null;
  const sharing = props.filter((prop) => prop.note === note).length;
  return sharing > 1 && sharing > props.length / 2 ? note : null;
}

/** A long list nobody has to act on stays folded, so that the rest is in sight. */
function Foldable({ count, children }: { count: number; children: ComponentChildren }) {
  if (count <= FOLDED_ABOVE) return <>{children}</>;
  return (
    <details>
      <summary>Show all {count}</summary>
      {children}
    </details>
  );
}

/** Must-not-fail first, then whatever looks dim first. */
function byUrgency(one: SiteForecastProp, other: SiteForecastProp): number {
  const weight = { 'must-not-fail': 0, feature: 1, background: 2 };
  const key = (prop: SiteForecastProp) =>
    `${prop.dim.early ?? '9999'} ${weight[prop.importance]} ${prop.tag}`;
  return key(one).localeCompare(key(other));
}
