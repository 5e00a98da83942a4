import { Refusal } from './refusal.ts';

/** What every list says when the entry a page should follow is not in it, or not any more. */
export function listChanged(after: string): Refusal {
  const message = `"${after}" is not in this list, or not any more: the list has changed. Start it again without after.`;
  return new Refusal('invalid', [{ field: 'after', message }]);
}
