import { useRef } from 'preact/hooks';
import { api, onceKey } from '../api/client.ts';
import type { CellType, NewSwap, Prop } from '../api/types.ts';
import { ChoiceField, PickField, TextField } from '../parts/field.tsx';
import { FormTrouble } from '../parts/notice.tsx';
import { type Form, type Reader, useForm } from '../state/form.ts';
import { useShell } from '../state/shell.tsx';
import { KIND_WORDS } from '../words/names.ts';
import { counted } from '../words/quantity.ts';
import { instantOfStamp, wallStamp } from '../words/time.ts';
import type { OnDone } from './sighting-buttons.tsx';

type SwapFormProps = { prop: Prop; cellTypes: CellType[]; timeZone: string; onDone: OnDone };

const usualSwap = (cellTypeId: string, wholeSet: number) => ({
  at: '',
  state: '',
  leftShare: '',
  cellTypeId,
  cells: String(wholeSet),
  setId: '',
  oldSet: '',
  note: '',
});

/** One form, filled in beforehand for the usual: now, a full set of new cells of the usual type. */
export function SwapForm({ prop, cellTypes, timeZone, onDone }: SwapFormProps) {
  const { momentAt } = useShell();
  const wholeSet = prop.units * prop.series * prop.parallel;
  const isRechargeable = cellTypes.find(({ id }) => id === prop.cellTypeId)?.rechargeable ?? false;
  const form = useForm(usualSwap(prop.cellTypeId, wholeSet));
  const key = useRef(onceKey());
  const { fields, faults } = form;
  // Untouched, the moment keeps up with the clock, and the usual state with the list of cell types.
  const at = fields.at || wallStamp(momentAt, timeZone);
  const state = fields.state || (isRechargeable ? 'charged' : 'new');

  const record = async () => {
    const swap = await form.send((read) =>
      api.recordSwap(prop.id, swapOf(read, { at, state, timeZone, wholeSet, momentAt }), key.current),
    );
    if (!swap) return;
    key.current = onceKey();
    form.reset(usualSwap(prop.cellTypeId, wholeSet));
    await onDone('Swap recorded.', { hints: swap.hints ?? [], undoId: swap.id });
  };

  return (
    <section class="swap" aria-labelledby="swap-title">
      <h2 id="swap-title">Record a swap</h2>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void record();
        }}
      >
        <FormTrouble text={form.trouble} />
        <ChoiceField
          label="What went in"
          value={state}
          onPick={(picked) => form.set('state', picked)}
          fault={faults.state}
          options={[
            { value: 'new', words: 'new' },
            { value: 'charged', words: 'charged' },
            { value: 'part-used', words: 'part-used' },
          ]}
        />
        {state === 'part-used' && (
          <TextField
            label="How much is left"
            unit="%"
            inputMode="numeric"
            optional
            width="short"
            value={fields.leftShare}
            onText={(text) => form.set('leftShare', text)}
            fault={faults.leftShare}
          />
        )}
        <button type="submit" class="button-main" aria-disabled={form.busy}>
          Record swap of {counted(Number(fields.cells) || wholeSet, 'cell')}
        </button>
        <SwapDetails form={form} prop={prop} cellTypes={cellTypes} at={at} wholeSet={wholeSet} />
      </form>
    </section>
  );
}

type SwapDetailsProps = {
  form: Form<ReturnType<typeof usualSwap>>;
  prop: Prop;
  cellTypes: CellType[];
  at: string;
  wholeSet: number;
};

/** What is seldom other than usual, folded away until it is or a fault is in it. */
function SwapDetails({ form, prop, cellTypes, at, wholeSet }: SwapDetailsProps) {
  const { fields, faults } = form;
  const isRechargeable = cellTypes.find(({ id }) => id === fields.cellTypeId)?.rechargeable ?? false;
  return (
    <details class="more" open={Object.keys(faults).length > 0}>
      <summary>When, which cells, the old set</summary>
      <TextField
        label="When"
        type="datetime-local"
        value={at}
        onText={(text) => form.set('at', text)}
        fault={faults.at}
        hint="Time at the site"
      />
      <PickField
        label="Cell type"
        value={fields.cellTypeId}
        onPick={(id) => form.set('cellTypeId', id)}
        fault={faults.cellTypeId}
        options={cellTypeOptions(cellTypes, prop.cellTypeId)}
      />
      <TextField
        label="Cells changed"
        inputMode="numeric"
        width="short"
        value={fields.cells}
        onText={(text) => form.set('cells', text)}
        fault={faults.cells}
        hint={`${wholeSet} is all of them`}
      />
      {isRechargeable && (
        <TextField
          label="Set letter"
          optional
          width="short"
          value={fields.setId}
          onText={(text) => form.set('setId', text)}
          fault={faults.setId}
        />
      )}
      <ChoiceField
        label="The old set looked"
        value={fields.oldSet}
        onPick={(seen) => form.set('oldSet', seen)}
        fault={faults.oldSet}
        options={[
          { value: '', words: 'did not look' },
          { value: 'bright', words: 'bright' },
          { value: 'dim', words: 'dim' },
          { value: 'dark', words: 'dark' },
        ]}
      />
      <TextField
        label="Note"
        optional
        value={fields.note}
        onText={(text) => form.set('note', text)}
        fault={faults.note}
      />
    </details>
  );
}

type SwapContext = { at: string; state: string; timeZone: string; wholeSet: number; momentAt: number };

function swapOf(read: Reader, { at, state, timeZone, wholeSet, momentAt }: SwapContext): NewSwap {
  const swap: NewSwap = {
    at: new Date(instantOfStamp(at, timeZone) ?? momentAt).toISOString(),
    state: state as NewSwap['state'],
    cellTypeId: read.text('cellTypeId'),
  };
  const left = swap.state === 'part-used' ? read.optionalNumber('leftShare') : undefined;
  const cells = read.optionalNumber('cells');
  const setId = read.optionalText('setId');
  const oldSet = read.optionalText('oldSet');
  const note = read.optionalText('note');
  if (left !== undefined) swap.leftShare = left / 100;
  if (cells !== undefined && cells !== wholeSet) swap.cells = cells;
  if (setId) swap.setId = setId;
  if (oldSet) swap.oldSet = oldSet as NonNullable<NewSwap['oldSet']>;
  if (note) swap.note = note;
  return swap;
}

/** Cell types by kind; the chosen one is offered even while the list is on its way. */
export function cellTypeOptions(cellTypes: CellType[], chosen: string) {
  const options = cellTypes.map(({ id, name, kind }) => ({
    value: id,
    words: `${id} · ${name}`,
    group: KIND_WORDS[kind],
  }));
  const isThere = chosen === '' || options.some(({ value }) => value === chosen);
  return isThere ? options : [{ value: chosen, words: chosen, group: 'in use' }, ...options];
}
