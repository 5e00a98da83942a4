import type { CellType } from '../api/types.ts';
import { ChoiceField, PickField, TextField } from '../parts/field.tsx';
import type { Form } from '../state/form.ts';
import { figures, readNumber, volts } from '../words/quantity.ts';
import type { Fields } from './prop-fields.ts';
import { cellTypeOptions } from './swap-form.tsx';

type Part = { form: Form<Fields> };

const bindTo = (form: Form<Fields>) => (field: string) => ({
  value: form.fields[field] ?? '',
  onText: (text: string) => form.set(field, text),
  fault: form.faults[field],
});
const pickTo = (form: Form<Fields>) => (field: string) => ({
  value: form.fields[field] ?? '',
  onPick: (value: string) => form.set(field, value),
  fault: form.faults[field],
});

export function NameFields({ form, zones }: Part & { zones: string[] }) {
  const bind = bindTo(form);
  return (
    <fieldset class="form-part">
      <legend>What it is</legend>
      <div class="field-pair">
        <TextField label="Tag" {...bind('tag')} hint="Short, on the prop itself: B-06" />
        <TextField label="Name" {...bind('name')} />
      </div>
      <div class="field-pair">
        <TextField label="Zone" {...bind('zone')} list={zones} hint="A part of the site walked together" />
        <TextField
          label="Alike in this row"
          inputMode="numeric"
          {...bind('units')}
          hint="5 tea lights at one stop: 5"
        />
      </div>
      <ChoiceField
        label="Importance"
        {...pickTo(form)('importance')}
        options={[
          { value: 'must-not-fail', words: 'must not fail' },
          { value: 'feature', words: 'feature' },
          { value: 'background', words: 'background' },
        ]}
      />
    </fieldset>
  );
}

export function CellFields({ form, cellTypes }: Part & { cellTypes: CellType[] }) {
  const bind = bindTo(form);
  const chosen = form.fields.cellTypeId ?? '';
  return (
    <fieldset class="form-part">
      <legend>Its cells</legend>
      <PickField
        label="Cell type"
        {...pickTo(form)('cellTypeId')}
        options={cellTypeOptions(cellTypes, chosen)}
      />
      <div class="field-pair">
        <TextField label="End to end" inputMode="numeric" {...bind('series')} hint="Volts add" />
        <TextField label="Rows side by side" inputMode="numeric" {...bind('parallel')} hint="mAh add" />
      </div>
      <p class="echo" role="status">
        {setWords(
          cellTypes.find(({ id }) => id === chosen),
          form.fields,
        )}
      </p>
      <div class="field-pair">
        <TextField
          label="Looks dim at"
          unit="V"
          inputMode="decimal"
          {...bind('dimVolts')}
          hint="Lit volts of the whole set, not of one cell"
        />
        <TextField
          label="Goes out at"
          unit="V"
          inputMode="decimal"
          optional
          {...bind('stopVolts')}
          hint="Lit volts of the whole set"
        />
      </div>
    </fieldset>
  );
}

/** Says a set back: '3 end to end: 4.5 V, 2500 mAh'. */
function setWords(cellType: CellType | undefined, fields: Fields): string {
  const series = readNumber(fields.series ?? '');
  const parallel = readNumber(fields.parallel ?? '');
  if (!cellType || series === null || parallel === null) return '';
  return `A set of ${series * parallel}: ${volts(series * cellType.nominalVolts)}, ${figures(parallel * cellType.capacityMah, 4)} mAh on the label.`;
}

export function DrawFields({ form }: Part) {
  const bind = bindTo(form);
  return (
    <fieldset class="form-part">
      <legend>What it takes, for one of a row</legend>
      <ChoiceField
        label="Measured as"
        {...pickTo(form)('measured')}
        options={[
          { value: 'mean', words: 'an average' },
          { value: 'low-peak', words: 'lowest and highest' },
        ]}
      />
      <CurrentFields form={form} />
      <div class="field-pair">
        <TextField
          label="While it waits"
          unit="mA"
          inputMode="decimal"
          optional
          {...bind('load.standbyMa')}
          hint="Too small for the meter? Leave it empty"
        />
        <TextField
          label="Measured at"
          unit="V"
          inputMode="decimal"
          optional
          {...bind('load.measuredVolts')}
          hint="Volts of the set just then"
        />
      </div>
      <ChoiceField
        label="As its cells run down"
        {...pickTo(form)('load.behaviour')}
        options={[
          { value: 'fades', words: 'it fades away' },
          { value: 'holds', words: 'it holds, then stops' },
          { value: 'steady', words: 'it takes the same' },
        ]}
        hint="A plain resistor fades; a step-up or regulated circuit holds"
      />
      {form.fields['load.behaviour'] === 'fades' && (
        <TextField
          label="LEDs stop at"
          unit="V"
          inputMode="decimal"
          optional
          width="short"
          {...bind('load.ledVolts')}
        />
      )}
    </fieldset>
  );
}

/** The current itself: one average, or its two ends and the way between them. */
function CurrentFields({ form }: Part) {
  const bind = bindTo(form);
  if (form.fields.measured === 'mean') {
    return (
      <TextField
        label="Average while lit"
        unit="mA"
        inputMode="decimal"
        {...bind('load.meanMa')}
        hint="A meter that shows 0.022 A reads 22 mA"
      />
    );
  }
  const hasShare = form.fields['load.wave'] === 'blink' || form.fields['load.wave'] === 'rc-fade';
  return (
    <>
      <div class="field-pair">
        <TextField label="Lowest" unit="mA" inputMode="decimal" {...bind('load.lowMa')} />
        <TextField label="Highest" unit="mA" inputMode="decimal" {...bind('load.peakMa')} />
      </div>
      <PickField
        label="How it goes between them"
        {...pickTo(form)('load.wave')}
        options={[
          { value: 'even-fade', words: 'fades up and down evenly' },
          { value: 'blink', words: 'blinks, on or off' },
          { value: 'rc-fade', words: 'jumps up, dies away' },
          { value: 'steady', words: 'steady' },
        ]}
      />
      {hasShare && (
        <TextField
          label="Share of the time high or rising"
          unit="%"
          inputMode="decimal"
          optional
          width="short"
          {...bind('load.onShare')}
        />
      )}
    </>
  );
}

export function SwitchingFields({ form }: Part) {
  const bind = bindTo(form);
  const kind = form.fields['switching.kind'];
  return (
    <fieldset class="form-part">
      <legend>When it is lit</legend>
      <PickField
        label="Switched by"
        {...pickTo(form)('switching.kind')}
        options={[
          { value: 'light-sensor', words: 'a light sensor' },
          { value: 'clock', words: 'a clock' },
          { value: 'interval-timer', words: 'an interval timer: so many hours on, then off' },
          { value: 'by-hand', words: 'hand, on show nights' },
          { value: 'always', words: 'nothing: always on' },
        ]}
      />
      {kind === 'light-sensor' && <SensorFields form={form} />}
      {kind === 'clock' && (
        <div class="field-pair">
          <TextField label="On" type="time" {...bind('switching.onAt')} />
          <TextField label="Off" type="time" {...bind('switching.offAt')} />
        </div>
      )}
      {kind === 'interval-timer' && (
        <div class="field-pair">
          <TextField
            label="Hours on"
            unit="h"
            inputMode="decimal"
            {...bind('switching.onHours')}
            hint="6 on and 18 off makes 24"
          />
          <TextField
            label="Set at"
            type="datetime-local"
            optional
            {...bind('switching.setAt')}
            hint="It counts from here, or from the last swap"
          />
        </div>
      )}
    </fieldset>
  );
}

function SensorFields({ form }: Part) {
  const bind = bindTo(form);
  return (
    <>
      <TextField
        label="Off again after"
        unit="h"
        inputMode="decimal"
        optional
        width="short"
        {...bind('switching.cutOffHours')}
        hint="Empty: lit until dawn"
      />
      <details>
        <summary>Where exactly the sensor switches</summary>
        <div class="field-pair">
          <TextField label="On below" unit="lux" inputMode="decimal" optional {...bind('switching.onLux')} />
          <TextField
            label="Off above"
            unit="lux"
            inputMode="decimal"
            optional
            {...bind('switching.offLux')}
          />
        </div>
        <div class="field-pair">
          <TextField
            label="On when the sun is at"
            unit="°"
            optional
            {...bind('switching.onAltitudeDeg')}
            hint="Instead of lux; −6 is the end of civil dusk"
          />
          <TextField label="Off when the sun is at" unit="°" optional {...bind('switching.offAltitudeDeg')} />
        </div>
        <TextField
          label="Open sky it sees"
          unit="%"
          inputMode="decimal"
          optional
          width="short"
          {...bind('switching.skyShare')}
          hint="100 in the open, 20 under trees"
        />
      </details>
    </>
  );
}

export function TripFields({ form }: Part) {
  const bind = bindTo(form);
  return (
    <fieldset class="form-part">
      <legend>Set off by visitors</legend>
      <ChoiceField
        label="Does it run when tripped?"
        {...pickTo(form)('hasTrips')}
        options={[
          { value: 'no', words: 'no' },
          { value: 'yes', words: 'yes' },
        ]}
      />
      {form.fields.hasTrips === 'yes' && (
        <>
          <div class="field-pair">
            <TextField label="Trips on a show night" inputMode="numeric" {...bind('trips.perShowNight')} />
            <TextField label="On a night off" inputMode="numeric" {...bind('trips.perNightOff')} />
          </div>
          <div class="field-pair">
            <TextField label="One run lasts" unit="s" inputMode="decimal" {...bind('trips.seconds')} />
            <TextField label="It takes" unit="mA" inputMode="decimal" {...bind('trips.runMa')} />
          </div>
        </>
      )}
    </fieldset>
  );
}

export function PlaceFields({ form }: Part) {
  const bind = bindTo(form);
  return (
    <details class="form-part">
      <summary>Where it stands</summary>
      <div class="field-pair">
        <TextField label="East" unit="m" optional {...bind('xM')} hint="Metres from a point of your own" />
        <TextField label="North" unit="m" optional {...bind('yM')} />
      </div>
      <TextField
        label="Colder or warmer than its zone"
        unit="°C"
        optional
        width="short"
        {...bind('offsetC')}
        hint="−2 in a frosty corner"
      />
    </details>
  );
}
