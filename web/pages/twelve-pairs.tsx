import type { Form } from '../state/form.ts';
import { splitNumbers } from '../words/quantity.ts';
import { MONTHS } from '../words/time.ts';

type Fields = Record<string, string>;

const KINDS = [
  { field: 'monthlyMinC', words: 'Mean minimum, °C' },
  { field: 'monthlyMaxC', words: 'Mean maximum, °C' },
] as const;

/** Twelve mean minima and maxima. A row copied from a table may be pasted into any of its fields. */
export function TwelvePairs({ form }: { form: Form<Fields> }) {
  const faults = Object.entries(form.faults).filter(([field]) => field.startsWith('monthly'));
  return (
    <fieldset class="twelve">
      <legend>Usual temperatures by month</legend>
      <p class="field-hint" id="twelve-hint">
        Mean daily minimum and maximum, from the climate table of the nearest station. A row of twelve numbers
        can be pasted into its first field.
      </p>
      <div class="twelve-grid">
        <span />
        {KINDS.map(({ field, words }) => (
          <span key={field} class="twelve-kind" id={`${field}-words`}>
            {words}
          </span>
        ))}
        {MONTHS.map((month, index) => [
          <span key={month} id={`month-${index}`}>
            {month}
          </span>,
          ...KINDS.map(({ field }) => {
            const name = `${field}.${index}`;
            return (
              <input
                key={name}
                type="text"
                inputMode="text"
                autocomplete="off"
                value={form.fields[name] ?? ''}
                aria-labelledby={`month-${index} ${field}-words`}
                aria-describedby={form.faults[name] ? 'twelve-faults' : 'twelve-hint'}
                aria-invalid={form.faults[name] ? 'true' : undefined}
                onInput={(event) => form.set(name, event.currentTarget.value)}
                onPaste={(event) => {
                  const numbers = splitNumbers(event.clipboardData?.getData('text') ?? '');
                  if (numbers.length < 2) return;
                  event.preventDefault();
                  for (const [offset, number] of numbers.slice(0, 12 - index).entries()) {
                    form.set(`${field}.${index + offset}`, number);
                  }
                }}
              />
            );
          }),
        ])}
      </div>
      <div id="twelve-faults">
        {faults.map(([field, message]) => (
          <span key={field} class="field-fault">
            {faultPlace(field)}: {message}
          </span>
        ))}
      </div>
    </fieldset>
  );
}

function faultPlace(field: string): string {
  const [kind, index] = field.split('.');
  const words = kind === 'monthlyMinC' ? 'minimum' : 'maximum';
  return index === undefined ? `All of the ${words} row` : `${MONTHS[Number(index)]} ${words}`;
}
