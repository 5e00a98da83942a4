import { useState } from 'preact/hooks';
import type { Answer } from '../api/client.ts';
import type { Problem } from '../api/types.ts';
import { readNumber } from '../words/quantity.ts';

/** A form: what was typed, what is wrong with it by field, and whether it is on its way. */
export type Form<Fields extends Record<string, string>> = {
  fields: Fields;
  set: (field: keyof Fields & string, text: string) => void;
  /** Every field at once, for starting over. */
  reset: (fields: Fields) => void;
  faults: Record<string, string>;
  /** What is wrong with the whole, or with a field the form does not show. */
  trouble: string | null;
  busy: boolean;
  send: <T>(make: (read: Reader) => Promise<Answer<T>> | null) => Promise<T | null>;
};

/** Reads typed text as values and keeps what cannot be read, by field. */
export type Reader = {
  text: (field: string) => string;
  optionalText: (field: string) => string | undefined;
  number: (field: string) => number;
  optionalNumber: (field: string) => number | undefined;
  /** Says what is wrong with a field that is read in a way of its own. */
  fault: (field: string, message: string) => void;
};

/**
 * @param initial typed text by field; a field carries the name it has in the request (`load.peakMa`), so that the
 *   server's sentence finds its place
 */
export function useForm<Fields extends Record<string, string>>(initial: Fields): Form<Fields> {
  const [fields, setFields] = useState(initial);
  const [faults, setFaults] = useState<Record<string, string>>({});
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);

  return {
    fields,
    faults,
    trouble,
    busy,
    set: (field, text) => setFields((old) => ({ ...old, [field]: text })),
    reset: (next) => {
      setFields(next);
      setFaults({});
      setTrouble(null);
    },
    send: async (make) => {
      if (busy) return null;
      const found: Record<string, string> = {};
      const pending = make(readerOf(fields, found));
      if (pending === null || Object.keys(found).length > 0) {
        setFaults(found);
        setTrouble('Some fields could not be read; each says why.');
        return null;
      }
      setBusy(true);
      const answer = await pending;
      setBusy(false);
      if (answer.ok) {
        setFaults({});
        setTrouble(null);
        return answer.value;
      }
      const sorted = sortFaults(answer.problem, Object.keys(fields));
      setFaults(sorted.faults);
      setTrouble(sorted.trouble);
      return null;
    },
  };
}

function readerOf(fields: Record<string, string>, found: Record<string, string>): Reader {
  const numberOf = (field: string, text: string): number => {
    const value = readNumber(text);
    if (value === null)
      found[field] = `\u201c${text.trim()}\u201d is not a number that can be read. Digits only, like 2.4.`;
    return value ?? 0;
  };
  const textOf = (field: string) => (fields[field] ?? '').trim();
  return {
    text: (field) => {
      if (textOf(field) === '') found[field] = 'This one is needed.';
      return textOf(field);
    },
    optionalText: (field) => textOf(field) || undefined,
    number: (field) => {
      if (textOf(field) !== '') return numberOf(field, textOf(field));
      found[field] = 'A number is needed here.';
      return 0;
    },
    optionalNumber: (field) => (textOf(field) === '' ? undefined : numberOf(field, textOf(field))),
    fault: (field, message) => {
      found[field] = message;
    },
  };
}

/**
 * The server's sentences by the field they belong to; those whose field is not on the form go to the top.
 * @param known names of the fields shown
 */
export function sortFaults(
  problem: Problem,
  known: string[],
): { faults: Record<string, string>; trouble: string } {
  const faults: Record<string, string> = {};
  const homeless: string[] = [];
  for (const { field, message } of problem.errors) {
    // 'monthlyMinC[3]', '/monthlyMinC/3' and 'monthlyMinC.3' are one place.
    const place = field.replace(/[/[]/g, '.').replaceAll(']', '').replace(/^\./, '');
    if (known.includes(place)) faults[place] = message;
    else homeless.push(place ? `${place}: ${message}` : message);
  }
  const lead = homeless.length > 0 ? homeless.join(' ') : problem.detail || problem.title;
  return { faults, trouble: lead };
}
