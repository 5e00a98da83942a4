import { removeProp as removeStoredProp } from '../store/props.ts';
import { raiseRevision } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { propOf } from './find-prop.ts';

/**
 * Removes a prop with its log. There is no way back.
 * @param deps what a deed needs
 * @param input which prop
 * @throws Refusal 'not-found'
 */
export function removeProp(deps: Deps, input: { propId: string }): void {
  deps.store.transact((db) => {
    const prop = propOf(db, input.propId);
    removeStoredProp(db, prop.id);
    raiseRevision(db, prop.siteId, deps.clock.now());
  });
}
