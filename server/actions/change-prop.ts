import type { Prop } from '../model/prop.ts';
import { updateProp } from '../store/props.ts';
import { raiseRevision } from '../store/sites.ts';
import { refuseProp, refuseTakenTag, tidyProp } from './add-prop.ts';
import type { Deps } from './deps.ts';
import { propOf } from './find-prop.ts';

type Optional = 'xM' | 'yM' | 'stopVolts' | 'trips' | 'offsetC';
/** Fields to replace, load and switching whole; null takes an optional one away. */
export type PropChanges = Partial<Omit<Prop, 'id' | 'siteId' | Optional>> & {
  [Field in Optional]?: NonNullable<Prop[Field]> | null;
};

/**
 * Changes a prop.
 * @param deps what a deed needs
 * @param input its id and the fields to replace
 * @throws Refusal 'not-found'; 'invalid' when the prop as a whole cannot be; 'conflict' when the tag is taken
 */
export function changeProp(deps: Deps, input: { propId: string; changes: PropChanges }): Prop {
  return deps.store.transact((db) => {
    const before = propOf(db, input.propId);
    const merged = { ...before, ...input.changes, id: before.id, siteId: before.siteId };
    const kept = Object.fromEntries(Object.entries(merged).filter(([, value]) => value !== null));
    const prop = tidyProp(kept as Prop);
    refuseProp(deps, prop);
    refuseTakenTag(db, prop);
    updateProp(db, prop);
    raiseRevision(db, prop.siteId, deps.clock.now());
    return prop;
  });
}
