/** The one place where the pages read the time. */
export const now = (): number => Date.now();
