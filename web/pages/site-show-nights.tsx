import { useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { ShowNight, Site } from '../api/types.ts';
import { TextField } from '../parts/field.tsx';
import { FormTrouble, Status, Trouble } from '../parts/notice.tsx';
import { type Form, useForm } from '../state/form.ts';
import { useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { addDays, dateWords } from '../words/time.ts';

const UNTOUCHED = { evening: '', opensAt: '', closesAt: '' };

/** The evenings visitors come, with gate hours; one may be called off or put in late. Every deed is kept at once. */
export function SiteShowNights({ site, onSaved }: { site: Site; onSaved: () => void }) {
  const { asOf } = useShell();
  const read = useRead(`show-nights ${site.id} ${asOf}`, () => api.showNights(site.id, asOf));
  const form = useForm(UNTOUCHED);
  const [said, setSaid] = useState('');
  const nights = read.value ?? [];
  const last = nights.at(-1);
  // What the next night is likely to be: the day after the last one, at the same hours.
  const typed = {
    evening: form.fields.evening || (last ? addDays(last.evening, 1) : site.seasonFrom),
    opensAt: form.fields.opensAt || (last?.opensAt ?? '18:30'),
    closesAt: form.fields.closesAt || (last?.closesAt ?? '21:30'),
  };

  const keep = async (next: ShowNight[], words: string) => {
    const saved = await form.send(() => api.setShowNights(site.id, next));
    setSaid(saved ? words : '');
    if (!saved) return;
    form.reset(UNTOUCHED);
    onSaved();
    await read.again();
  };
  const without = (evening: string) => nights.filter((night) => night.evening !== evening);
  const add = () =>
    keep(
      [...without(typed.evening), typed].toSorted((one, other) => one.evening.localeCompare(other.evening)),
      `${dateWords(typed.evening)} is a show night.`,
    );
  const callOff = (night: ShowNight, calledOff: boolean) =>
    keep(
      nights.map((one) => (one === night ? { ...one, calledOff } : one)),
      `${dateWords(night.evening)} is ${calledOff ? 'called off' : 'on again'}.`,
    );

  return (
    <section class="sheet" aria-labelledby="shows-title">
      <h2 id="shows-title">Show nights</h2>
      {read.problem && <Trouble problem={read.problem} onAgain={() => void read.again()} />}
      {read.value?.length === 0 && (
        <p class="soft">None yet. Without show nights, every night of the season counts as a night off.</p>
      )}
      <ul class="show-nights">
        {nights.map((night) => (
          <ShowNightLine
            key={night.evening}
            night={night}
            onCallOff={(calledOff) => void callOff(night, calledOff)}
            onTakeOut={() => void keep(without(night.evening), `${dateWords(night.evening)} is taken out.`)}
          />
        ))}
      </ul>
      <Status>{said}</Status>
      <AddNight form={form} typed={typed} onAdd={() => void add()} />
    </section>
  );
}

type AddNightProps = { form: Form<typeof UNTOUCHED>; typed: typeof UNTOUCHED; onAdd: () => void };

function AddNight({ form, typed, onAdd }: AddNightProps) {
  return (
    <form
      onSubmit={(event) => {
        event.preventDefault();
        onAdd();
      }}
    >
      <FormTrouble text={form.trouble} />
      <TextField
        label="Another evening"
        type="date"
        value={typed.evening}
        onText={(text) => form.set('evening', text)}
        hint="One that is there already gets the new hours"
      />
      <div class="field-pair">
        <TextField
          label="Gate opens"
          type="time"
          value={typed.opensAt}
          onText={(text) => form.set('opensAt', text)}
        />
        <TextField
          label="Gate closes"
          type="time"
          value={typed.closesAt}
          onText={(text) => form.set('closesAt', text)}
        />
      </div>
      <button type="submit">Add this night</button>
    </form>
  );
}

type LineProps = { night: ShowNight; onCallOff: (calledOff: boolean) => void; onTakeOut: () => void };

function ShowNightLine({ night, onCallOff, onTakeOut }: LineProps) {
  const off = night.calledOff ?? false;
  return (
    <li class={off ? 'called-off' : undefined}>
      <span class="show-night-words">
        {dateWords(night.evening)}{' '}
        <span class="show-night-time">
          {night.opensAt} – {night.closesAt}
        </span>
        {off && ' called off'}
      </span>
      <button
        type="button"
        class="quiet"
        aria-label={`${off ? 'On again' : 'Call off'}: ${dateWords(night.evening)}`}
        onClick={() => onCallOff(!off)}
      >
        {off ? 'On again' : 'Call off'}
      </button>
      <button
        type="button"
        class="quiet"
        aria-label={`Take out ${dateWords(night.evening)}`}
        onClick={onTakeOut}
      >
        Take out
      </button>
    </li>
  );
}
