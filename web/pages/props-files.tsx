import { Fragment } from 'preact';
import { useId, useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { Problem, PropsImported, Site } from '../api/types.ts';
import { LinesField } from '../parts/field.tsx';
import { Status, Trouble } from '../parts/notice.tsx';
import { TableRoom } from '../parts/table-room.tsx';
import { useShell } from '../state/shell.tsx';
import { counted } from '../words/quantity.ts';

const MOST_SHOWN = 200;

/** Props, log and forecast as files, and props out of a spreadsheet: looked through first, then taken in. */
export function PropsFiles({ site, onImported }: { site: Site; onImported: () => void }) {
  const { asOf } = useShell();
  const address = (name: string) => `/api/sites/${site.id}/${name}.csv`;
  return (
    <div class="sheet files">
      <h2>Out</h2>
      <div class="button-row">
        <a class="button button-plain" href={address('props')} download>
          Props
        </a>
        <a class="button button-plain" href={address('log')} download>
          Log
        </a>
        <a
          class="button button-plain"
          href={`${address('forecast')}${asOf ? `?asOf=${encodeURIComponent(asOf)}` : ''}`}
          download
        >
          Forecast
        </a>
      </div>
      <p class="soft">CSV files that every spreadsheet opens. The one of the props can be taken in again.</p>
      <h2>In</h2>
      <TakeIn site={site} onImported={onImported} />
    </div>
  );
}

type Step = {
  busy: 'looking' | 'taking' | null;
  rows: Blob | null;
  looked: PropsImported | null;
  taken: PropsImported | null;
  problem: Problem | null;
};
const START: Step = { busy: null, rows: null, looked: null, taken: null, problem: null };

function TakeIn({ site, onImported }: { site: Site; onImported: () => void }) {
  const id = useId();
  const [pasted, setPasted] = useState('');
  const [step, setStep] = useState<Step>(START);
  const look = async (rows: Blob) => {
    setStep({ ...START, busy: 'looking', rows });
    const answer = await api.importProps(site.id, rows, { dryRun: true });
    setStep({ ...START, rows, ...(answer.ok ? { looked: answer.value } : { problem: answer.problem }) });
  };
  const take = async (rows: Blob) => {
    if (step.busy) return;
    setStep({ ...step, busy: 'taking' });
    const answer = await api.importProps(site.id, rows, { dryRun: false });
    if (!answer.ok) return setStep({ ...step, busy: null, problem: answer.problem });
    // Somebody else may have changed the site in between: then it is looked at again.
    if (answer.value.rejected.length > 0) return setStep({ ...START, rows, looked: answer.value });
    setStep({ ...START, taken: answer.value });
    setPasted('');
    onImported();
  };
  return (
    <>
      <div class="field">
        <label for={id}>Props file</label>
        <input
          id={id}
          type="file"
          accept=".csv,.txt,.tsv,text/csv"
          aria-describedby={`${id}-hint`}
          onClick={(event) => {
            // The same file, mended, must be read again.
            event.currentTarget.value = '';
          }}
          onChange={(event) => void readOnce(event.currentTarget.files?.[0], look)}
        />
        <span class="field-hint" id={`${id}-hint`}>
          First row: headings as in the file that comes out. Nothing is changed yet.
        </span>
      </div>
      <LinesField
        label="Or rows pasted from a spreadsheet"
        value={pasted}
        onText={setPasted}
        hint="Headings first. A tag that is here already changes that prop."
      />
      <button type="button" onClick={() => pasted.trim() !== '' && void look(new Blob([pasted]))}>
        Look through these rows
      </button>
      {step.problem && <Trouble problem={step.problem} />}
      <Status>
        {step.busy === 'looking' && 'Looking through the rows …'}
        {step.busy === 'taking' && 'Taking them in …'}
        {step.looked && !step.busy && <p class="lead">{verdictOf(step.looked)}</p>}
        {step.taken && <p class="notice notice-done">Taken in: {changesOf(step.taken)}.</p>}
      </Status>
      {step.looked && <Looked report={step.looked} />}
      {step.looked && step.rows && step.looked.accepted > 0 && (
        <button
          type="button"
          class="button-main"
          aria-disabled={step.busy !== null}
          onClick={() => void take(step.rows!)}
        >
          Take in {counted(step.looked.accepted, 'prop')}
        </button>
      )}
    </>
  );
}

/** A file that is changed on the disk can no longer be sent, so what was looked at is kept. */
async function readOnce(file: File | undefined, look: (rows: Blob) => Promise<void>): Promise<void> {
  if (file) await look(new Blob([await file.arrayBuffer()]));
}

function changesOf({ added, changed, unchanged }: PropsImported): string {
  return `${added} new, ${changed} changed, ${unchanged} as before`;
}

function verdictOf(report: PropsImported): string {
  const { rows, rejected, unlisted, added, changed, unchanged } = report;
  if (rejected.length > 0) {
    const good = added + changed + unchanged;
    return `${good} of ${counted(rows, 'row')} would do. ${counted(rejected.length + unlisted, 'fault')} to mend first: nothing is taken in until then.`;
  }
  if (rows === 0) return 'There are headings, and no rows below them.';
  return `All ${counted(rows, 'row')} would do: ${changesOf(report)}.`;
}

function Looked({ report }: { report: PropsImported }) {
  const { rejected, unlisted, notes, changes } = report;
  const more = unlisted + Math.max(0, rejected.length - MOST_SHOWN);
  return (
    <>
      {rejected.length > 0 && <Remarks label="Faults" remarks={rejected} />}
      {more > 0 && <p class="soft">And {counted(more, 'more', 'more')}: mend these first.</p>}
      {notes.length > 0 && (
        <details>
          <summary>{counted(notes.length, 'thing')} read in another way than written</summary>
          <Remarks label="Read in another way" remarks={notes} />
        </details>
      )}
      {rejected.length === 0 && changes.length > 0 && (
        <details open>
          <summary>What would change</summary>
          <ul>
            {changes.slice(0, MOST_SHOWN).map(({ row, tag, name, isNew, fields }) => (
              <li key={row}>
                <span class="tag">{tag}</span> <bdi>{name}</bdi>: {isNew ? 'new' : fields.join(', ')}
              </li>
            ))}
          </ul>
          {report.added + report.changed > MOST_SHOWN && (
            <p class="soft">The first {MOST_SHOWN} are shown.</p>
          )}
        </details>
      )}
    </>
  );
}

function Remarks({ label, remarks }: { label: string; remarks: PropsImported['rejected'] }) {
  return (
    <TableRoom label={label}>
      <table class="remarks">
        <thead>
          <tr>
            <th scope="col">Row</th>
            <th scope="col">Column</th>
            <th scope="col">What</th>
          </tr>
        </thead>
        <tbody>
          {remarks.slice(0, MOST_SHOWN).map(({ row, field, message }) => (
            <tr key={`${row} ${field} ${message}`}>
              <th scope="row">{row}</th>
              <td>
                <bdi>
                  {field.split('.').map((part, index) => (
                    <Fragment key={part}>
                      {index > 0 && '.'}
                      {index > 0 && <wbr />}
                      {part}
                    </Fragment>
                  ))}
                </bdi>
              </td>
              <td>
                <bdi>{message}</bdi>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </TableRoom>
  );
}
