import { useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { Site, SiteForecast, SiteForecastProp } from '../api/types.ts';
import { ChoiceField, TextField } from '../parts/field.tsx';
import { Link } from '../parts/link.tsx';
import { Status, Trouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { forgetAnswers, useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { GROUP_WORDS } from '../words/names.ts';
import { counted } from '../words/quantity.ts';
import { PropRow, WickKey } from './prop-row.tsx';
import { PropsFiles } from './props-files.tsx';

type Order = 'tag' | 'swap';

/** Every prop of the site, zone by zone. */
export function PropsPage({ site }: { site: Site }) {
  const { asOf, tonight } = useShell();
  const forecast = useRead(`forecast ${site.id} ${asOf}`, () => api.siteForecast(site.id, asOf));
  const [wanted, setWanted] = useState('');
  const [order, setOrder] = useState<Order>('tag');
  const props = forecast.value?.props ?? [];
  const shown = props.filter((prop) => isWanted(prop, wanted));
  const readAgain = () => {
    forgetAnswers();
    void forecast.again();
  };

  return (
    <div class="props" aria-busy={forecast.loading}>
      <PageHead title="Props">
        <Link path="/props/new" class="button">
          Add a prop
        </Link>
      </PageHead>
      <details>
        <summary>In and out of spreadsheets</summary>
        <PropsFiles site={site} onImported={readAgain} />
      </details>
      {forecast.problem && <Trouble problem={forecast.problem} onAgain={() => void forecast.again()} />}
      {!forecast.value && !forecast.problem && <Waiting what="the props" />}
      {props.length > 0 && (
        <search class="finder">
          <TextField
            label="Find"
            value={wanted}
            onText={setWanted}
            hint="Tag, name, zone, or a word like “fine” or “at risk”"
          />
          <ChoiceField
            label="Order"
            value={order}
            onPick={setOrder}
            options={[
              { value: 'tag', words: 'by zone and tag' },
              { value: 'swap', words: 'first to swap' },
            ]}
          />
        </search>
      )}
      {props.length > 0 && <WickKey />}
      <Status>{wanted.trim() !== '' && `${counted(shown.length, 'prop')} of ${props.length}`}</Status>
      {forecast.value && props.length === 0 && (
        <p class="lead">No props yet. The first one starts the list.</p>
      )}
      {forecast.value && order === 'tag' && (
        <ByZone props={shown} forecast={forecast.value} tonight={tonight} />
      )}
      {forecast.value && order === 'swap' && (
        <ul class="rows">
          {shown.toSorted(bySwap).map((prop) => (
            <PropRow
              key={prop.propId}
              prop={prop}
              tonight={tonight}
              nextRound={forecast.value!.nextRound}
              withSign
            />
          ))}
        </ul>
      )}
    </div>
  );
}

/** Every word typed must be found somewhere in what the row says. */
function isWanted(prop: SiteForecastProp, wanted: string): boolean {
  const said =
    `${prop.tag} ${prop.name} ${prop.zone} ${GROUP_WORDS[prop.group].short} ${prop.lastSeen ?? ''} ${prop.importance.replaceAll('-', ' ')}`.toLowerCase();
  return wanted
    .toLowerCase()
    .split(/\s+/)
    .every((word) => said.includes(word));
}

const byTag = (one: SiteForecastProp, other: SiteForecastProp) =>
  one.tag.localeCompare(other.tag, 'en', { numeric: true });

const bySwap = (one: SiteForecastProp, other: SiteForecastProp) =>
  (one.swapBy ?? '9999').localeCompare(other.swapBy ?? '9999') || byTag(one, other);

/** Zones in the order of the first tag in each, which is how people number a walk. */
function ByZone({
  props,
  forecast,
  tonight,
}: {
  props: SiteForecastProp[];
  forecast: SiteForecast;
  tonight: string;
}) {
  const sorted = props.toSorted(byTag);
  const zones = [...new Set(sorted.map(({ zone }) => zone))];
  return (
    <>
      {zones.map((zone) => {
        const inside = sorted.filter((prop) => prop.zone === zone);
        return (
          <section key={zone} class="group">
            <h2>
              {zone} <span class="group-count">{inside.length}</span>
            </h2>
            <ul class="rows">
              {inside.map((prop) => (
                <PropRow
                  key={prop.propId}
                  prop={prop}
                  tonight={tonight}
                  nextRound={forecast.nextRound}
                  withSign
                />
              ))}
            </ul>
          </section>
        );
      })}
    </>
  );
}
