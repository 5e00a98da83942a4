import type { NewProp as NewPropInput } from '../actions/add-prop.ts';
import type { PropChanges as PropChangesInput } from '../actions/change-prop.ts';
import { yearFaults } from '../actions/known-years.ts';
import { type Fault, refuseFaults } from '../actions/refusal.ts';
import { check } from '../model/check.ts';
import { type Instant, parseInstant } from '../model/evening.ts';
import type { Switching as SwitchingValue } from '../model/switching.ts';
import { NewProp, type PropChanges, type Switching } from './schemas/props.ts';
import { faultFinder } from './validate.ts';

/**
 * An instant of a checked request.
 * @param text as it came; its schema has made sure that it is a moment
 */
export function instantOf(text: string): Instant {
  const at = parseInstant(text);
  check(at !== null, `"${text}" passed the schema but is no instant`);
  return at;
}

/** The moment a read is asked as of; nothing when it is not said. */
export function asOfIn(query: { asOf?: string }): { asOf?: Instant } {
  if (query.asOf === undefined) return {};
  const asOf = instantOf(query.asOf);
  refuseFaults(yearFaults(asOf, 'asOf'));
  return { asOf };
}

/** A new prop as the actions take it. */
export function newPropOf(body: NewProp): NewPropInput {
  return { ...body, switching: switchingOf(body.switching) };
}

const newPropFaults = faultFinder(NewProp);

/** A new prop out of a file, checked as one in a body is. */
export function readNewProp(value: unknown): { prop: NewPropInput } | { faults: Fault[] } {
  const faults = newPropFaults(value);
  return faults.length > 0 ? { faults } : { prop: newPropOf(value as NewProp) };
}

/** Changes to a prop as the actions take them. */
export function propChangesOf({ switching, ...body }: PropChanges): PropChangesInput {
  return switching === undefined ? body : { ...body, switching: switchingOf(switching) };
}

function switchingOf(switching: Switching): SwitchingValue {
  if (switching.kind !== 'interval-timer') return switching;
  const { setAt, ...timer } = switching;
  return setAt === undefined ? timer : { ...timer, setAt: instantOf(setAt) };
}
