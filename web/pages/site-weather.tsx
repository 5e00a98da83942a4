import { useId, useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { Night, Problem, Site, WeatherImported } from '../api/types.ts';
import { TextField } from '../parts/field.tsx';
import { FormTrouble, Status, Trouble } from '../parts/notice.tsx';
import { useForm } from '../state/form.ts';
import { useRead } from '../state/read.ts';
import { counted, degrees } from '../words/quantity.ts';
import { dateWords } from '../words/time.ts';
import { WeatherInUse } from './weather-in-use.tsx';

type SiteWeatherProps = { site: Site; nights: Night[]; tonight: string; onSaved: () => void };

/** Where each night's temperature comes from, and two ways to know better. */
export function SiteWeather({ site, nights, tonight, onSaved }: SiteWeatherProps) {
  const count = (weather: Night['weather']) => nights.filter((night) => night.weather === weather).length;
  return (
    <section class="sheet" aria-labelledby="weather-title">
      <h2 id="weather-title">Weather</h2>
      {nights.length > 0 && (
        <p>
          Of {counted(nights.length, 'night')}: {count('observed')} observed, {count('forecast')} from a
          forecast, {count('climate')} as usual for the month. A typed night beats a file, a file beats the
          usual. The table above says which.
        </p>
      )}
      <WeatherFile site={site} onSaved={onSaved} />
      <TypedNight site={site} tonight={tonight} onSaved={onSaved} />
    </section>
  );
}

function WeatherFile({ site, onSaved }: { site: Site; onSaved: () => void }) {
  const id = useId();
  const [busy, setBusy] = useState(false);
  const [imported, setImported] = useState<WeatherImported | null>(null);
  const [problem, setProblem] = useState<Problem | null>(null);
  const inUse = useRead(`weather ${site.id}`, () => api.weatherInUse(site.id));
  const changed = () => {
    onSaved();
    void inUse.again();
  };
  const remove = () => {
    setImported(null);
    changed();
  };
  const take = async (file: File | undefined) => {
    if (!file) return;
    setBusy(true);
    const answer = await api.importWeather(site.id, file);
    setBusy(false);
    setImported(answer.ok ? answer.value : null);
    setProblem(answer.ok ? null : answer.problem);
    if (answer.ok) changed();
  };
  return (
    <>
      <h3>From a file</h3>
      <div class="field">
        <label for={id}>Weather file</label>
        <input
          id={id}
          type="file"
          accept=".csv,.epw,.txt,text/csv"
          aria-describedby={`${id}-hint`}
          onChange={(event) => void take(event.currentTarget.files?.[0])}
        />
        <span class="field-hint" id={`${id}-hint`}>
          EPW, TMY3 CSV, GHCN-Daily CSV, or plain “time,tempC”
        </span>
      </div>
      {problem && <Trouble problem={problem} />}
      {inUse.value && <WeatherInUse site={site} inUse={inUse.value} onRemoved={remove} />}
      <Status>
        {busy && 'Reading the file …'}
        {imported && !busy && <ImportedWords imported={imported} />}
      </Status>
    </>
  );
}

function ImportedWords({ imported }: { imported: WeatherImported }) {
  return (
    <div class="notice notice-done">
      <p>
        {counted(imported.rows, 'row')} read as {imported.format}, {imported.from} to {imported.through}
        {imported.station && `, station ${imported.station.name}`}.
      </p>
      {imported.warnings.map((warning) => (
        <p key={warning}>{warning}</p>
      ))}
      {imported.rejected.length > 0 && (
        <details>
          <summary>{counted(imported.rejected.length, 'line')} left out</summary>
          <ul>
            {imported.rejected.slice(0, 50).map(({ line, message }) => (
              <li key={line}>
                Line {line}: {message}
              </li>
            ))}
          </ul>
        </details>
      )}
    </div>
  );
}

function TypedNight({ site, tonight, onSaved }: { site: Site; tonight: string; onSaved: () => void }) {
  const form = useForm({ evening: tonight, minC: '', maxC: '' });
  const [said, setSaid] = useState('');
  const { fields, faults, set } = form;
  const save = async () => {
    const saved = await form.send((read) =>
      api.typeNight(site.id, {
        evening: read.text('evening'),
        minC: read.number('minC'),
        maxC: read.number('maxC'),
      }),
    );
    setSaid(
      saved
        ? `${dateWords(fields.evening)}: ${degrees(Number(fields.minC))} to ${degrees(Number(fields.maxC))}.`
        : '',
    );
    if (saved) onSaved();
  };
  return (
    <>
      <h3>One night, typed</h3>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void save();
        }}
      >
        <FormTrouble text={form.trouble} />
        <TextField
          label="Evening"
          type="date"
          value={fields.evening}
          onText={(text) => set('evening', text)}
          fault={faults.evening}
        />
        <div class="field-pair">
          <TextField
            label="Lowest"
            unit="°C"
            value={fields.minC}
            onText={(text) => set('minC', text)}
            fault={faults.minC}
          />
          <TextField
            label="Highest"
            unit="°C"
            value={fields.maxC}
            onText={(text) => set('maxC', text)}
            fault={faults.maxC}
            hint="That evening's"
          />
        </div>
        <button type="submit">Save this night</button>
        <Status>{said}</Status>
      </form>
    </>
  );
}
