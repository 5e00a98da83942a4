/** Why a deed is not done; what each means to the outside is decided in http. */
export type RefusalCode = 'not-found' | 'invalid' | 'conflict' | 'replay-differs';

/** One thing wrong with what was asked: `field` is a path like 'load.peakMa'. */
export type Fault = { field: string; message: string };

/** An expected no, in a sentence a person can act on. */
export class Refusal extends Error {
  override name = 'Refusal';
  readonly code: RefusalCode;
  readonly faults: Fault[];

  constructor(code: RefusalCode, reason: string | Fault[]) {
    super(typeof reason === 'string' ? reason : summary(reason));
    this.code = code;
    this.faults = typeof reason === 'string' ? [] : reason;
  }
}

function summary(faults: Fault[]): string {
  const [first, ...others] = faults;
  if (!first) return '';
  if (others.length === 0) return first.message;
  const rest = others.length === 1 ? 'another field needs' : `${others.length} other fields need`;
  return `${first.message} And ${rest} a look: see errors.`;
}

/** What a deed says of an id nobody has; the same words for ids that never were and ids that are gone. */
export function nothingCalled(noun: string, id: string): Refusal {
  return new Refusal('not-found', `There is no ${noun} "${id}" here. It may have been removed.`);
}

/**
 * Refuses when something is wrong with what was asked.
 * @throws Refusal 'invalid' naming every fault
 */
export function refuseFaults(faults: Fault[]): void {
  if (faults.length > 0) throw new Refusal('invalid', faults);
}
