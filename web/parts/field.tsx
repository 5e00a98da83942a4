import type { ComponentChildren } from 'preact';
import { useId } from 'preact/hooks';

type FieldBase = { label: string; hint?: ComponentChildren; fault?: string | undefined };

type TextFieldProps = FieldBase & {
  value: string;
  onText: (text: string) => void;
  type?: 'text' | 'date' | 'time' | 'datetime-local';
  inputMode?: 'decimal' | 'numeric' | 'text';
  unit?: string;
  optional?: boolean;
  list?: string[];
  width?: 'short' | 'full';
};

/** A labelled field; hint and fault are tied to it, so that they are read out with it. */
export function TextField(props: TextFieldProps) {
  const id = useId();
  const { label, hint, fault, value, onText, type = 'text', inputMode, unit, optional, list, width } = props;
  return (
    <div class={`field${width === 'short' ? ' field-short' : ''}`}>
      <label for={id}>
        {label}
        {optional && <span class="field-optional"> optional</span>}
      </label>
      <span class="field-line">
        <input
          id={id}
          type={type}
          value={value}
          {...(inputMode ? { inputMode } : {})}
          {...(list ? { list: `${id}-list` } : {})}
          autocomplete="off"
          aria-invalid={fault ? 'true' : undefined}
          aria-describedby={describedBy(id, hint, fault)}
          onInput={(event) => onText(event.currentTarget.value)}
        />
        {unit && <span class="field-unit">{unit}</span>}
      </span>
      {list && (
        <datalist id={`${id}-list`}>
          {list.map((word) => (
            <option key={word} value={word} />
          ))}
        </datalist>
      )}
      <Below id={id} hint={hint} fault={fault} />
    </div>
  );
}

type LinesFieldProps = FieldBase & { value: string; onText: (text: string) => void };

/** Several lines of text. */
export function LinesField({ label, hint, fault, value, onText }: LinesFieldProps) {
  const id = useId();
  return (
    <div class="field">
      <label for={id}>{label}</label>
      <textarea
        id={id}
        rows={3}
        value={value}
        aria-invalid={fault ? 'true' : undefined}
        aria-describedby={describedBy(id, hint, fault)}
        onInput={(event) => onText(event.currentTarget.value)}
      />
      <Below id={id} hint={hint} fault={fault} />
    </div>
  );
}

type PickFieldProps = FieldBase & {
  value: string;
  onPick: (value: string) => void;
  options: { value: string; words: string; group?: string }[];
};

/** One of several, from a list. */
export function PickField({ label, hint, fault, value, onPick, options }: PickFieldProps) {
  const id = useId();
  const groups = [...new Set(options.map(({ group }) => group))];
  return (
    <div class="field">
      <label for={id}>{label}</label>
      <select
        id={id}
        value={value}
        aria-invalid={fault ? 'true' : undefined}
        aria-describedby={describedBy(id, hint, fault)}
        onChange={(event) => onPick(event.currentTarget.value)}
      >
        {groups.map((group) => {
          const inside = options
            .filter((option) => option.group === group)
            .map((option) => (
              <option key={option.value} value={option.value} selected={option.value === value}>
                {option.words}
              </option>
            ));
          return group ? (
            <optgroup key={group} label={group}>
              {inside}
            </optgroup>
          ) : (
            inside
          );
        })}
      </select>
      <Below id={id} hint={hint} fault={fault} />
    </div>
  );
}

type ChoiceFieldProps<Value extends string> = FieldBase & {
  value: Value;
  onPick: (value: Value) => void;
  options: { value: Value; words: string }[];
};

/** One of a few, all in sight. */
export function ChoiceField<Value extends string>(props: ChoiceFieldProps<Value>) {
  const id = useId();
  const { label, hint, fault, value, onPick, options } = props;
  return (
    <fieldset class="field choice" aria-describedby={describedBy(id, hint, fault)}>
      <legend>{label}</legend>
      <div class="choice-row">
        {options.map((option) => (
          <label key={option.value} class="choice-one">
            <input
              type="radio"
              name={id}
              checked={option.value === value}
              onChange={() => onPick(option.value)}
            />
            <span>{option.words}</span>
          </label>
        ))}
      </div>
      <Below id={id} hint={hint} fault={fault} />
    </fieldset>
  );
}

/** Yes or no. */
export function TickField(props: { label: string; checked: boolean; onTick: (checked: boolean) => void }) {
  return (
    <label class="tick">
      <input
        type="checkbox"
        checked={props.checked}
        onChange={(event) => props.onTick(event.currentTarget.checked)}
      />
      <span>{props.label}</span>
    </label>
  );
}

function describedBy(id: string, hint: ComponentChildren, fault: string | undefined): string | undefined {
  return [hint ? `${id}-hint` : '', fault ? `${id}-fault` : ''].filter(Boolean).join(' ') || undefined;
}

function Below({ id, hint, fault }: { id: string; hint: ComponentChildren; fault: string | undefined }) {
  return (
    <>
      {hint && (
        <span class="field-hint" id={`${id}-hint`}>
          {hint}
        </span>
      )}
      {fault && (
        <span class="field-fault" id={`${id}-fault`}>
          {fault}
        </span>
      )}
    </>
  );
}
