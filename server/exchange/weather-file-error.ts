/** A weather file that cannot be used; its message says what was found, the likely slip and the way out. */
export class WeatherFileError extends Error {
  override readonly name = 'WeatherFileError';
}

export type RejectedLine = { line: number; message: string };

const LISTED = 100;

/** Lines of a file that were left out, the first hundred by line and the rest by count. */
export class RejectedLines {
  readonly listed: RejectedLine[] = [];
  count = 0;

  add(line: number, message: string): void {
    this.count++;
    if (this.listed.length < LISTED) this.listed.push({ line, message });
  }

  /** The sentence that stands for the lines not listed; none when all are. */
  warnings(): string[] {
    const more = this.count - this.listed.length;
    return more > 0 ? [`${more} more lines were rejected; only the first ${LISTED} are listed.`] : [];
  }
}
