/** Bodies already written out, by the mark of what they were made from; the longest unused goes first. */
export type KeptBodies = { bodyOf(mark: string, write: () => string): string };

/**
 * Keeps the last bodies that were asked for: every page of the crew asks for the same one.
 * @param most how many are kept, 1 or more
 */
export function keptBodies(most: number): KeptBodies {
  const kept = new Map<string, string>();
  return {
    bodyOf(mark, write) {
      const body = kept.get(mark) ?? write();
      kept.delete(mark);
      kept.set(mark, body);
      if (kept.size > most) kept.delete(kept.keys().next().value!);
      return body;
    },
  };
}
