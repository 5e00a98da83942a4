/**
 * The names somebody may have meant, nearest first. Ours: fewest letters changed, added, left out or swapped with
 * their neighbour, capitals ignored; a name more than a third away is no guess worth making.
 * @param typed what was typed
 * @param names the names there are
 * @param atMost how many guesses at most
 */
export function nearNames(typed: string, names: readonly string[], atMost = 3): string[] {
  const wanted = typed.toLowerCase().slice(0, LONGEST);
  const guesses: { name: string; steps: number }[] = [];
  for (const name of names) {
    const steps = stepsBetween(wanted, name.toLowerCase());
    if (steps <= Math.max(1, Math.ceil(wanted.length / 3))) guesses.push({ name, steps });
  }
  return guesses
    .sort((a, b) => a.steps - b.steps)
    .slice(0, atMost)
    .map((guess) => guess.name);
}

/**
 * A question naming the guesses, with a blank before it; empty when there are none.
 * @param guesses names, nearest first
 */
export function didYouMean(guesses: readonly string[]): string {
  if (guesses.length === 0) return '';
  const quoted = guesses.map((name) => `"${name}"`);
  const last = quoted.pop();
  return ` Did you mean ${quoted.length > 0 ? `${quoted.join(', ')} or ` : ''}${last}?`;
}

const LONGEST = 64;

// Source: the optimal string alignment distance (Damerau 1964, Levenshtein 1966).
function stepsBetween(a: string, b: string): number {
  let before: number[] = [];
  let above = Array.from({ length: b.length + 1 }, (_, index) => index);
  for (let row = 1; row <= a.length; row += 1) {
    const here = [row];
    for (let column = 1; column <= b.length; column += 1) {
      const same = a[row - 1] === b[column - 1] ? 0 : 1;
      let steps = Math.min(above[column]! + 1, here[column - 1]! + 1, above[column - 1]! + same);
      const swapped = a[row - 1] === b[column - 2] && a[row - 2] === b[column - 1];
      if (row > 1 && column > 1 && swapped) steps = Math.min(steps, before[column - 2]! + 1);
      here.push(steps);
    }
    before = above;
    above = here;
  }
  return above[b.length]!;
}
