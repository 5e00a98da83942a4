import type { NewSite, Site } from '../api/types.ts';
import { ChoiceField, LinesField, TextField } from '../parts/field.tsx';
import type { Form, Reader } from '../state/form.ts';
import { readOffsets } from '../words/quantity.ts';

type Fields = Record<string, string>;

const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];
const TWELVE = Array.from({ length: 12 }, (_, index) => index);

/** A site as typed text; without one, what a first form starts from. */
export function siteFields(site: Site | null, timeZone: string): Fields {
  const rounds = site?.rounds;
  const fields: Fields = {
    name: site?.name ?? '',
    latitudeDeg: site ? String(site.latitudeDeg) : '',
    longitudeDeg: site ? String(site.longitudeDeg) : '',
    timeZone: site?.timeZone ?? timeZone,
    seasonFrom: site?.seasonFrom ?? '',
    seasonThrough: site?.seasonThrough ?? '',
    confidence: String(Math.round((site?.confidence ?? 0.9) * 1000) / 10),
    marginNights: String(site?.marginNights ?? 1),
    'rounds.weekdays': (rounds?.weekdays ?? [3, 6]).join(' '),
    'rounds.startsAt': rounds?.startsAt ?? '18:30',
    'rounds.minutesFree': String(rounds?.minutesFree ?? 90),
    'rounds.minutesPerStop': String(rounds?.minutesPerStop ?? 3),
    'rounds.walkMinutes': String(rounds?.walkMinutes ?? 25),
    'rounds.cost': String(rounds?.cost ?? 0),
    zoneOffsetsC: Object.entries(site?.zoneOffsetsC ?? {})
      .map(([zone, offsetC]) => `${zone}: ${offsetC}`)
      .join('\n'),
  };
  for (const index of TWELVE) {
    fields[`monthlyMinC.${index}`] = site ? String(site.monthlyMinC[index]) : '';
    fields[`monthlyMaxC.${index}`] = site ? String(site.monthlyMaxC[index]) : '';
  }
  return fields;
}

export const placeOf = (read: Reader) => ({
  name: read.text('name'),
  latitudeDeg: read.number('latitudeDeg'),
  longitudeDeg: read.number('longitudeDeg'),
  timeZone: read.text('timeZone'),
  seasonFrom: read.text('seasonFrom'),
  seasonThrough: read.text('seasonThrough'),
});

export const twelveOf = (read: Reader) => ({
  monthlyMinC: TWELVE.map((index) => read.number(`monthlyMinC.${index}`)),
  monthlyMaxC: TWELVE.map((index) => read.number(`monthlyMaxC.${index}`)),
});

export const habitsOf = (read: Reader) => ({
  confidence: read.number('confidence') / 100,
  marginNights: read.number('marginNights'),
  rounds: {
    weekdays: (read.optionalText('rounds.weekdays') ?? '').split(' ').filter(Boolean).map(Number),
    startsAt: read.text('rounds.startsAt'),
    minutesFree: read.number('rounds.minutesFree'),
    minutesPerStop: read.number('rounds.minutesPerStop'),
    walkMinutes: read.number('rounds.walkMinutes'),
    cost: read.number('rounds.cost'),
  },
  zoneOffsetsC: offsetsOf(read),
});

function offsetsOf(read: Reader): Record<string, number> {
  const { offsets, unread } = readOffsets(read.optionalText('zoneOffsetsC') ?? '');
  if (unread.length > 0) {
    read.fault(
      'zoneOffsetsC',
      `\u201c${unread[0]}\u201d is not a zone and a number. Write it like “Mill Race: -3”.`,
    );
  }
  return offsets;
}

export const newSiteOf = (read: Reader): NewSite => ({
  ...placeOf(read),
  ...twelveOf(read),
  ...habitsOf(read),
});

/** Where the display stands and when. */
export function PlaceFields({ form }: { form: Form<Fields> }) {
  const { fields, faults, set } = form;
  const bind = (field: string) => ({
    value: fields[field] ?? '',
    onText: (text: string) => set(field, text),
    fault: faults[field],
  });
  return (
    <>
      <TextField label="Name" {...bind('name')} />
      <div class="field-pair">
        <TextField
          label="Latitude"
          unit="°"
          inputMode="text"
          {...bind('latitudeDeg')}
          hint="North positive: 54.40"
        />
        <TextField
          label="Longitude"
          unit="°"
          inputMode="text"
          {...bind('longitudeDeg')}
          hint="East positive, west negative: −2.40"
        />
      </div>
      <TextField
        label="Time zone"
        {...bind('timeZone')}
        list={Intl.supportedValuesOf('timeZone')}
        hint="Of the place, like Europe/London"
      />
      <div class="field-pair">
        <TextField
          label="Season from"
          type="date"
          {...bind('seasonFrom')}
          hint="First evening anything is lit"
        />
        <TextField label="Season through" type="date" {...bind('seasonThrough')} hint="Last evening" />
      </div>
    </>
  );
}

/** How rounds go here, and how sure one wants to be. */
export function HabitFields({ form }: { form: Form<Fields> }) {
  const { fields, faults, set } = form;
  const bind = (field: string) => ({
    value: fields[field] ?? '',
    onText: (text: string) => set(field, text),
    fault: faults[field],
  });
  return (
    <>
      <Weekdays
        value={fields['rounds.weekdays'] ?? ''}
        onPick={(days) => set('rounds.weekdays', days)}
        fault={faults['rounds.weekdays']}
      />
      <div class="field-pair">
        <TextField label="Rounds start" type="time" {...bind('rounds.startsAt')} />
        <TextField label="Time for one" unit="min" inputMode="decimal" {...bind('rounds.minutesFree')} />
      </div>
      <div class="field-pair">
        <TextField label="At each stop" unit="min" inputMode="decimal" {...bind('rounds.minutesPerStop')} />
        <TextField label="Walking the loop" unit="min" inputMode="decimal" {...bind('rounds.walkMinutes')} />
      </div>
      <TextField
        label="What a round costs"
        inputMode="decimal"
        width="short"
        {...bind('rounds.cost')}
        hint="In the money cells are priced in; 0 if nothing"
      />
      <TextField
        label="How sure to be"
        unit="%"
        inputMode="decimal"
        width="short"
        {...bind('confidence')}
        hint="The chance of bright light on every show night that “swap by” keeps"
      />
      <ChoiceField
        label="Nights of slack beyond the next round"
        value={fields.marginNights ?? '1'}
        onPick={(nights) => set('marginNights', nights)}
        fault={faults.marginNights}
        options={['0', '1', '2', '3', '4', '5'].map((nights) => ({ value: nights, words: nights }))}
      />
      <LinesField
        label="Colder or warmer zones"
        value={fields.zoneOffsetsC ?? ''}
        onText={(text) => set('zoneOffsetsC', text)}
        fault={faults.zoneOffsetsC}
        hint="One a line, degrees against the rest of the site: Mill Race: -3"
      />
    </>
  );
}

function Weekdays({
  value,
  onPick,
  fault,
}: {
  value: string;
  onPick: (days: string) => void;
  fault: string | undefined;
}) {
  const days = new Set(value.split(' ').filter(Boolean));
  return (
    <fieldset class="field choice">
      <legend>Days people can walk a round</legend>
      <div class="choice-row">
        {WEEKDAYS.map((word, index) => {
          const day = String(index + 1);
          return (
            <label key={day} class="choice-one">
              <input
                type="checkbox"
                checked={days.has(day)}
                onChange={() => {
                  const next = new Set(days);
                  if (!next.delete(day)) next.add(day);
                  onPick([...next].sort().join(' '));
                }}
              />
              <span>{word}</span>
            </label>
          );
        })}
      </div>
      {fault && <span class="field-fault">{fault}</span>}
    </fieldset>
  );
}
