/** A fault in our own code: a caller broke a promise. Never raised for what a person typed; that is refused at the door. */
export class ProgrammerError extends Error {
  override readonly name = 'ProgrammerError';
}

/**
 * Stops when a promise between functions is broken.
 * @param condition what must hold
 * @param message a sentence naming the value that broke it
 * @throws ProgrammerError when the condition is falsy
 */
export function check(condition: unknown, message: string): asserts condition {
  if (!condition) throw new ProgrammerError(message);
}

/**
 * Stops when a number is NaN or infinite.
 * @param value the number
 * @param name what it is called, with its unit
 * @throws ProgrammerError
 */
export function checkFinite(value: number, name: string): void {
  if (!Number.isFinite(value)) throw new ProgrammerError(`${name} must be a finite number, but is ${value}.`);
}

/**
 * Stops when a number is NaN or outside a range, ends included.
 * @param value the number
 * @param name what it is called, with its unit
 * @param range smallest and largest allowed value
 * @throws ProgrammerError
 */
export function checkWithin(value: number, name: string, range: { min: number; max: number }): void {
  if (!(value >= range.min && value <= range.max)) {
    throw new ProgrammerError(`${name} must be from ${range.min} to ${range.max}, but is ${value}.`);
  }
}
