import { useEffect, useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { CellType, Prop, Site } from '../api/types.ts';
import { FormTrouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { useForm } from '../state/form.ts';
import { forgetAnswers, useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { fieldsOfProp, newPropOf, propChangesOf } from './prop-fields.ts';
import {
  CellFields,
  DrawFields,
  NameFields,
  PlaceFields,
  SwitchingFields,
  TripFields,
} from './prop-form-fields.tsx';
import { NoProp } from './prop-page.tsx';

/** A new prop, with every field the contract has. */
export function NewPropPage({ site }: { site: Site }) {
  return <PropForm site={site} prop={null} />;
}

/** The same form over a prop that is there. */
export function ChangePropPage({ propId }: { propId: string }) {
  const { sites } = useShell();
  const prop = useRead(`prop ${propId}`, () => api.prop(propId));
  const site = sites?.find(({ id }) => id === prop.value?.siteId);
  if (prop.problem) return <NoProp problem={prop.problem} onAgain={() => void prop.again()} />;
  if (!prop.value || !site) return <Waiting what="the prop" />;
  return <PropForm site={site} prop={prop.value} />;
}

function PropForm({ site, prop }: { site: Site; prop: Prop | null }) {
  const { go, to } = useShell();
  const cellTypes = useRead('cell-types', api.cellTypes);
  const others = useRead(`props ${site.id}`, () => api.props(site.id));
  const form = useForm(fieldsOfProp(prop, site.timeZone));
  const zones = [...new Set((others.value ?? []).map(({ zone }) => zone))];
  const [failures, setFailures] = useState(0);
  useFirstFault(failures);

  const save = async () => {
    const saved = await form.send((read) =>
      prop ? api.changeProp(prop.id, propChangesOf(read, site)) : api.addProp(newPropOf(read, site)),
    );
    if (!saved) return setFailures((count) => count + 1);
    forgetAnswers();
    go(to(`/props/${saved.id}`));
  };

  const types: CellType[] = cellTypes.value ?? [];
  return (
    <div class="narrow">
      <PageHead title={prop ? `Change ${prop.tag} ${prop.name}` : 'Add a prop'} />
      <form
        class="sheet"
        onSubmit={(event) => {
          event.preventDefault();
          void save();
        }}
      >
        <FormTrouble text={form.trouble} />
        <NameFields form={form} zones={zones} />
        <CellFields form={form} cellTypes={types} />
        <DrawFields form={form} />
        <SwitchingFields form={form} />
        <TripFields form={form} />
        <PlaceFields form={form} />
        <button type="submit" class="button-main" aria-disabled={form.busy}>
          {prop ? 'Save the changes' : 'Add this prop'}
        </button>
      </form>
    </div>
  );
}

/** After a refusal the focus goes to the first field that has something to say. */
function useFirstFault(failures: number): void {
  useEffect(() => {
    if (failures > 0) document.querySelector<HTMLElement>('form [aria-invalid="true"]')?.focus();
  }, [failures]);
}
