import { useEffect, useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { ShowNight, Site } from '../api/types.ts';
import { TickField } from '../parts/field.tsx';
import { FormTrouble, Status, Trouble } from '../parts/notice.tsx';
import { sortFaults } from '../state/form.ts';
import { useRead } from '../state/read.ts';
import { addDays, dateWords } from '../words/time.ts';

/** The evenings visitors come, with gate hours; one may be called off or put in late. */
export function SiteShowNights({ site, onSaved }: { site: Site; onSaved: () => void }) {
  const read = useRead(`show-nights ${site.id}`, () => api.showNights(site.id));
  const [nights, setNights] = useState<ShowNight[] | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [said, setSaid] = useState('');
  useEffect(() => setNights(read.value), [read.value]);

  const shown = nights ?? [];
  const change = (index: number, changes: Partial<ShowNight>) =>
    setNights(shown.map((night, place) => (place === index ? { ...night, ...changes } : night)));
  const add = () => {
    const last = shown.at(-1);
    const evening = last ? addDays(last.evening, 1) : site.seasonFrom;
    setNights([
      ...shown,
      { evening, opensAt: last?.opensAt ?? '18:30', closesAt: last?.closesAt ?? '21:30' },
    ]);
  };
  const save = async () => {
    const answer = await api.setShowNights(
      site.id,
      shown.toSorted((one, other) => one.evening.localeCompare(other.evening)),
    );
    setTrouble(answer.ok ? null : sortFaults(answer.problem, []).trouble);
    setSaid(answer.ok ? 'Show nights saved.' : '');
    if (!answer.ok) return;
    onSaved();
    await read.again();
  };

  return (
    <section class="sheet" aria-labelledby="shows-title">
      <h2 id="shows-title">Show nights</h2>
      {read.problem && <Trouble problem={read.problem} onAgain={() => void read.again()} />}
      {nights?.length === 0 && (
        <p class="soft">None yet. Without show nights, every night of the season counts as a night off.</p>
      )}
      <FormTrouble text={trouble} />
      <ul class="show-nights">
        {shown.map((night, index) => (
          <li key={index} class={night.calledOff ? 'called-off' : undefined}>
            <input
              type="date"
              aria-label="Evening"
              value={night.evening}
              onInput={(event) => change(index, { evening: event.currentTarget.value })}
            />
            <input
              type="time"
              aria-label={`${say(night)}: gate opens`}
              value={night.opensAt}
              onInput={(event) => change(index, { opensAt: event.currentTarget.value })}
            />
            <input
              type="time"
              aria-label={`${say(night)}: gate closes`}
              value={night.closesAt}
              onInput={(event) => change(index, { closesAt: event.currentTarget.value })}
            />
            <TickField
              label="called off"
              checked={night.calledOff ?? false}
              onTick={(calledOff) => change(index, { calledOff })}
            />
            <button
              type="button"
              class="quiet"
              aria-label={`Take out ${say(night)}`}
              onClick={() => setNights(shown.filter((_, place) => place !== index))}
            >
              Take out
            </button>
          </li>
        ))}
      </ul>
      <div class="button-row">
        <button type="button" class="button-plain" onClick={add}>
          Add a night
        </button>
        <button type="button" onClick={() => void save()}>
          Save show nights
        </button>
      </div>
      <Status>{said}</Status>
    </section>
  );
}

const say = (night: ShowNight) =>
  /^\d{4}-\d{2}-\d{2}$/.test(night.evening) ? dateWords(night.evening) : 'new night';
