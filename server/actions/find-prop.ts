import type { Prop } from '../model/prop.ts';
import type { Db } from '../store/open.ts';
import { findProp } from '../store/props.ts';
import { nothingCalled } from './refusal.ts';

/**
 * The prop with an id.
 * @param db the database, or the transaction a deed is in
 * @param propId its id
 * @throws Refusal 'not-found'
 */
export function propOf(db: Db, propId: string): Prop {
  const prop = findProp(db, propId);
  if (!prop) throw nothingCalled('prop', propId);
  return prop;
}
