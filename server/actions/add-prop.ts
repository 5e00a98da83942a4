import type { Prop } from '../model/prop.ts';
import type { Db } from '../store/open.ts';
import { countProps, findPropByTag, insertProp } from '../store/props.ts';
import { raiseRevision } from '../store/sites.ts';
import { propFaults } from './check-prop.ts';
import type { Deps } from './deps.ts';
import { findCellTypeAnywhere, unknownCellTypeFault } from './find-cell-type.ts';
import { siteOf } from './find-site.ts';
import { Refusal, refuseFaults } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

export type NewProp = Omit<Prop, 'id' | 'units' | 'importance'> & Partial<Pick<Prop, 'units' | 'importance'>>;

export const MOST_PROPS = 10_000;

/**
 * Adds a prop to a site.
 * @param deps what a deed needs
 * @param input the prop; one unit and a feature unless it says otherwise
 * @throws Refusal 'not-found' for the site; 'invalid' naming every fault; 'conflict' when the tag is taken
 */
export function addProp(deps: Deps, input: NewProp): Prop {
  return deps.store.transact((db) => {
    siteOf(db, input.siteId);
    const prop = tidyProp({ units: 1, importance: 'feature', ...input, id: deps.newId() });
    refuseProp(deps, prop);
    refuseTakenTag(db, prop);
    if (countProps(db, prop.siteId) >= MOST_PROPS)
      throw new Refusal(
        'conflict',
        `This site has ${MOST_PROPS} props, the most one site holds. Make a second site for the rest.`,
      );
    insertProp(db, prop);
    raiseRevision(db, prop.siteId, deps.clock.now());
    return prop;
  });
}

/**
 * A prop with its texts as they are kept.
 * @param prop the prop as given
 */
export function tidyProp(prop: Prop): Prop {
  return { ...prop, tag: tidyText(prop.tag), name: tidyText(prop.name), zone: tidyText(prop.zone) };
}

/**
 * Refuses a prop that cannot be.
 * @param deps what a deed needs
 * @param prop the prop as it would be kept
 * @throws Refusal 'invalid' naming every fault
 */
export function refuseProp(deps: Deps, prop: Prop): void {
  const cellType = findCellTypeAnywhere(deps, prop.cellTypeId);
  refuseFaults(
    cellType ? propFaults(prop, cellType) : [unknownCellTypeFault(deps.store.db, prop.cellTypeId)],
  );
}

/**
 * Refuses a tag that another prop of the site has.
 * @param db the transaction a deed is in
 * @param prop the prop as it would be kept
 * @throws Refusal 'conflict' naming the other prop
 */
export function refuseTakenTag(db: Db, prop: Prop): void {
  const holder = findPropByTag(db, prop.siteId, prop.tag);
  if (!holder || holder.id === prop.id) return;
  const message = `${prop.tag} is already "${holder.name}" in ${holder.zone}. Give this one another tag, or did you mean that one?`;
  throw new Refusal('conflict', [{ field: 'tag', message }]);
}
