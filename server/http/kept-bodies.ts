/** Bodies already written out, by the mark of what they were made from; the longest unused goes first. */
export type KeptBodies = { bodyOf(mark: string, write: () => string): string };

/**
 * Keeps the last bodies that were asked for: every page of the crew asks for the same one.
 * @param mostLength how many characters are kept in all, 1 or more; the last body is kept whatever its length
 */
export function keptBodies(mostLength: number): KeptBodies {
  const kept = new Map<string, string>();
  let length = 0;
  return {
    bodyOf(mark, write) {
      const known = kept.get(mark);
      const body = known ?? write();
      if (known === undefined) length += body.length;
      kept.delete(mark);
      kept.set(mark, body);
      for (const [oldest, { length: its }] of kept) {
        if (length <= mostLength || oldest === mark) break;
        kept.delete(oldest);
        length -= its;
      }
      return body;
    },
  };
}
