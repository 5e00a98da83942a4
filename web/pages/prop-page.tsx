import { useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { CellType, EveningRange, LogEntry, Prop, PropForecast, Site } from '../api/types.ts';
import { Link } from '../parts/link.tsx';
import { Cautions, Status, Trouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { forgetAnswers, useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { cautionsFor, REMINDER } from '../words/cautions.ts';
import { drawWords, entryWords, IMPORTANCE_WORDS, switchingWords } from '../words/names.ts';
import { wiringWords } from '../words/quantity.ts';
import { dimWords, rangeWords, swapByWords } from '../words/range.ts';
import { nightMeant, shortMomentWords } from '../words/time.ts';
import { PropSeason } from './prop-season.tsx';
import { PropSum } from './prop-sum.tsx';
import { SightingButtons } from './sighting-buttons.tsx';
import { SwapForm } from './swap-form.tsx';

/** What a deed changed: said once, with the way back. */
type Done = { text: string; hints: string[]; undoId: string | null };

/** One prop: when it looks dim, why, what was done to it, and what can be done now. */
export function PropPage({ propId }: { propId: string }) {
  const { asOf, momentAt, sites } = useShell();
  const prop = useRead(`prop ${propId}`, () => api.prop(propId));
  const forecast = useRead(`prop-forecast ${propId} ${asOf}`, () => api.forecast(propId, asOf));
  const log = useRead(`log ${propId}`, () => api.log(propId));
  const cellTypes = useRead('cell-types', api.cellTypes);
  const [done, setDone] = useState<Done | null>(null);
  const site = sites?.find(({ id }) => id === prop.value?.siteId);

  if (!prop.value || !site) {
    if (prop.problem) return <Trouble problem={prop.problem} onAgain={() => void prop.again()} />;
    return <Waiting what="the prop" />;
  }
  const tonight = nightMeant(momentAt, site.timeZone);
  const cellType = cellTypes.value?.find(
    ({ id }) => id === (forecast.value?.cellTypeId ?? prop.value!.cellTypeId),
  );

  /** Reads everything again and says how the date moved. */
  const afterDeed = async (text: string, deed: { hints: string[]; undoId: string | null }) => {
    const before = forecast.value;
    forgetAnswers();
    const [after] = await Promise.all([forecast.again(), log.again()]);
    setDone({ ...deed, text: `${text} ${movedWords(before, after, tonight)}` });
  };
  const undo = async (entryId: string) => {
    const answer = await api.undo(propId, entryId);
    if (answer.ok) await afterDeed('Undone.', { hints: [], undoId: null });
    else setDone({ text: `${answer.problem.title}. ${answer.problem.detail}`, hints: [], undoId: entryId });
  };

  return (
    <article class="prop">
      <PropHead prop={prop.value} />
      <Status>{done && <DoneNotice done={done} onUndo={(id) => void undo(id)} />}</Status>
      {forecast.problem && <Trouble problem={forecast.problem} onAgain={() => void forecast.again()} />}
      {!forecast.value && !forecast.problem && <Waiting what="the forecast" />}
      <div class="prop-columns">
        {forecast.value && <PropAnswer forecast={forecast.value} tonight={tonight} />}
        <div class="prop-side">
          <SightingButtons prop={prop.value} onDone={afterDeed} />
          <SwapForm
            prop={prop.value}
            cellTypes={cellTypes.value ?? []}
            timeZone={site.timeZone}
            onDone={afterDeed}
          />
          {cellType && <KindCautions cellType={cellType} prop={prop.value} />}
          <LogList entries={log.value?.entries ?? []} site={site} onUndo={(id) => void undo(id)} />
        </div>
        {forecast.value && (
          <div class="prop-main">
            <PropSeason
              forecast={forecast.value}
              entries={log.value?.entries ?? []}
              timeZone={site.timeZone}
              tonight={tonight}
            />
            <PropSum forecast={forecast.value} prop={prop.value} tonight={tonight} timeZone={site.timeZone} />
          </div>
        )}
      </div>
    </article>
  );
}

function PropHead({ prop }: { prop: Prop }) {
  return (
    <>
      <PageHead title={`${prop.tag} ${prop.name}`}>
        <Link path={`/props/${prop.id}/change`} class="button button-plain">
          Change
        </Link>
      </PageHead>
      <p class="prop-about">
        {prop.zone} · {IMPORTANCE_WORDS[prop.importance]} · {prop.units > 1 && `row of ${prop.units}, each `}
        {prop.cellTypeId}, {wiringWords(prop.series, prop.parallel)} · {switchingWords(prop.switching)} ·{' '}
        {drawWords(prop)}
      </p>
    </>
  );
}

function DoneNotice({ done, onUndo }: { done: Done; onUndo: (entryId: string) => void }) {
  return (
    <div class="notice notice-done">
      <p>{done.text}</p>
      {done.hints.map((hint) => (
        <p key={hint}>{hint}</p>
      ))}
      {done.undoId !== null && (
        <button type="button" class="quiet" onClick={() => onUndo(done.undoId!)}>
          Undo
        </button>
      )}
    </div>
  );
}

/** 'Dim: was Thu 22 – Sat 24 Oct, now Mon 2 Nov or later.' */
export function movedWords(before: PropForecast | null, after: PropForecast | null, tonight: string): string {
  if (!after) return 'The new date is on its way.';
  const now = rangeWords(after.dim, tonight);
  const was = before?.usableMah ? rangeWords(before.dim, tonight) : null;
  if (was === null) return `Dim: ${now}.`;
  return was === now ? `Dim: still ${now}.` : `Dim: was ${was}, now ${now}.`;
}

function PropAnswer({ forecast, tonight }: { forecast: PropForecast; tonight: string }) {
  if (forecast.fittedAt === null) {
    return (
      <section class="answer" aria-label="Answer">
        <p class="lead">Nobody has said when cells went in.</p>
        <p>Record a swap, and the dates follow from it.</p>
      </section>
    );
  }
  return (
    <section class="answer" aria-label="Answer">
      <p class="lead">{capital(dimWords(forecast.dim, tonight))}</p>
      <dl class="facts">
        <RangeFact name="Looks dim" range={forecast.dim} tonight={tonight} />
        <RangeFact name="Goes dark" range={forecast.dark} tonight={tonight} />
        <div>
          <dt>Swap</dt>
          <dd>{swapByWords(forecast.swapBy, tonight).replace(/^swap /, '')}</dd>
        </div>
        {forecast.cause && (
          <div>
            <dt>Because</dt>
            <dd>
              {forecast.cause === 'cold' ? 'of the cold: warm it before you throw it out' : 'it is used up'}
            </dd>
          </div>
        )}
      </dl>
    </section>
  );
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

function RangeFact({ name, range, tonight }: { name: string; range: EveningRange; tonight: string }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>{rangeWords(range, tonight)}</dd>
    </div>
  );
}

function KindCautions({ cellType, prop }: { cellType: CellType; prop: Prop }) {
  return (
    <Cautions title="Before you open it" cautions={cautionsFor(cellType.kind, prop)} reminder={REMINDER} />
  );
}

type LogListProps = { entries: LogEntry[]; site: Site; onUndo: (entryId: string) => void };

function LogList({ entries, site, onUndo }: LogListProps) {
  const kept = entries.filter((entry) => entry.undoneAt === undefined);
  return (
    <section class="log" aria-labelledby="log-title">
      <h2 id="log-title">Log</h2>
      {kept.length === 0 && <p class="soft">Nothing recorded yet.</p>}
      <ol>
        {kept.map((entry) => {
          const when = shortMomentWords(Date.parse(entry.at), site.timeZone);
          return (
            <li key={entry.id}>
              <div>
                <span class="log-when">{when}</span>
                <span>{entryWords(entry)}</span>
                {entry.note && <span class="soft">{entry.note}</span>}
              </div>
              <button
                type="button"
                class="quiet"
                aria-label={`Undo: ${entryWords(entry)}, ${when}`}
                onClick={() => onUndo(entry.id)}
              >
                Undo
              </button>
            </li>
          );
        })}
      </ol>
    </section>
  );
}
