// The years one can ask about. The Sun and the calendar of this model hold 1900 to 2199; keeping well inside, the
// evening before and the sunrise after are always known too.

export const FIRST_KNOWN_YEAR = 2000;
export const LAST_KNOWN_YEAR = 2150;

/** First known moment, UTC. */
export const FIRST_KNOWN_AT = Date.UTC(FIRST_KNOWN_YEAR, 0, 1);
/** The moment after the last known one, UTC. */
export const AFTER_KNOWN_AT = Date.UTC(LAST_KNOWN_YEAR + 1, 0, 1);
