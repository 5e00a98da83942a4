import type { ComponentChildren } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type {
  CellType,
  LogEntry,
  Problem,
  Prop,
  PropForecast,
  Site,
  SiteForecastProp,
} from '../api/types.ts';
import { sign } from '../drawing/sign.ts';
import { Link } from '../parts/link.tsx';
import { Cautions, Status, Trouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { forgetAnswers, useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { cautionsFor, REMINDER } from '../words/cautions.ts';
import { drawWords, entryWords, GROUP_WORDS, IMPORTANCE_WORDS, switchingWords } from '../words/names.ts';
import { percent, wiringWords } from '../words/quantity.ts';
import { dimWords, movedWords, rangeWords, swapByWords } from '../words/range.ts';
import { eveningAhead, shortMomentWords } from '../words/time.ts';
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
  const siteForecast = useRead(prop.value && `forecast ${prop.value.siteId} ${asOf}`, () =>
    api.siteForecast(prop.value!.siteId, asOf),
  );
  const [done, setDone] = useState<Done | null>(null);
  const site = sites?.find(({ id }) => id === prop.value?.siteId);

  if (!prop.value || !site) {
    if (prop.problem) return <NoProp problem={prop.problem} onAgain={() => void prop.again()} />;
    return <Waiting what="the prop" />;
  }
  const tonight = eveningAhead(momentAt, site.timeZone);
  const cellType = cellTypes.value?.find(
    ({ id }) => id === (forecast.value?.cellTypeId ?? prop.value!.cellTypeId),
  );

  const line = siteForecast.value?.props.find((one) => one.propId === propId) ?? null;
  const nextRound = siteForecast.value?.nextRound ?? null;
  // A day before the last deed may be asked for: what was recorded after it has not happened yet.
  const entries = (log.value ?? []).filter(
    (entry) => entry.undoneAt === undefined && Date.parse(entry.at) <= momentAt,
  );

  /** Reads everything again and says how the date moved. */
  const afterDeed = async (text: string, deed: { hints: string[]; undoId: string | null }) => {
    const before = forecast.value;
    forgetAnswers();
    const [after] = await Promise.all([forecast.again(), log.again(), siteForecast.again()]);
    setDone({
      ...deed,
      text: `${text} ${movedWords({ before: dimOf(before), after: dimOf(after), tonight })}`,
    });
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
        {forecast.value && <PropAnswer forecast={forecast.value} line={line} tonight={tonight} />}
        <div class="prop-side">
          <SightingButtons prop={prop.value} onDone={afterDeed} />
          <SwapForm
            prop={prop.value}
            cellTypes={cellTypes.value ?? []}
            timeZone={site.timeZone}
            onDone={afterDeed}
          />
          {cellType && <KindCautions cellType={cellType} prop={prop.value} />}
          <LogList entries={entries} site={site} onUndo={(id) => void undo(id)} />
        </div>
        {forecast.value && (
          <div class="prop-main">
            <PropSeason
              forecast={forecast.value}
              entries={entries}
              timeZone={site.timeZone}
              tonight={tonight}
              nextRound={nextRound}
            />
            <PropSum forecast={forecast.value} prop={prop.value} tonight={tonight} timeZone={site.timeZone} />
          </div>
        )}
      </div>
    </article>
  );
}

/** The dim range, where there is a set to reckon with. */
const dimOf = (forecast: PropForecast | null) => (forecast?.usableMah ? forecast.dim : null);

/** Instead of a prop: why it is not there. */
export function NoProp({ problem, onAgain }: { problem: Problem; onAgain: () => void }) {
  return (
    <>
      <PageHead title={problem.status === 404 ? 'No such prop' : 'The prop did not come'} />
      <Trouble problem={problem} onAgain={onAgain} />
    </>
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
  const notice = useRef<HTMLDivElement>(null);
  // On a phone the deed is done far below: whoever did it should see the date move.
  useEffect(() => notice.current?.scrollIntoView({ block: 'nearest' }), [done]);
  return (
    <div class="notice notice-done" ref={notice}>
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

type AnswerProps = { forecast: PropForecast; line: SiteForecastProp | null; tonight: string };

function PropAnswer({ forecast, line, tonight }: AnswerProps) {
  if (forecast.fittedAt === null) {
    return (
      <section class="answer" aria-label="Answer">
        <p class="lead">Nobody has said when cells went in.</p>
        <p>Record a swap, and the dates follow from it.</p>
      </section>
    );
  }
  const swap = forecast.swapBy === null ? '' : `; ${swapByWords(forecast.swapBy, tonight)}`;
  return (
    <section class="answer" aria-label="Answer">
      <p class="lead">{`${capital(dimWords(forecast.dim, tonight))}${swap}.`}</p>
      {line?.note && <p>{line.note}</p>}
      {dimsUnseen(forecast) && <p class="soft">It may look dim before that, on nights without visitors.</p>}
      <dl class="facts">
        {line && (
          <Fact name="Group">
            <span class="row-group">
              {sign(line.group)} {GROUP_WORDS[line.group].short}
            </span>
          </Fact>
        )}
        <Fact name="Goes dark">{rangeWords(forecast.dark, tonight)}</Fact>
        {forecast.usedShare !== null && <Fact name="Used">{percent(forecast.usedShare)}</Fact>}
        {forecast.cause && (
          <Fact name="Because">{forecast.cause === 'cold' ? 'the cold' : 'charge used up'}</Fact>
        )}
      </dl>
      {forecast.cause === 'cold' && (
        <p class="soft">
          Gone dark in the cold, a set may be good again indoors: warm and test it before it is thrown out.
        </p>
      )}
    </section>
  );
}

/** Whether it may go dim on a night off before it has to be swapped. */
function dimsUnseen({ dim, swapBy }: PropForecast): boolean {
  return dim.early !== null && swapBy !== null && dim.early < swapBy;
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

function Fact({ name, children }: { name: string; children: ComponentChildren }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}

function KindCautions({ cellType, prop }: { cellType: CellType; prop: Prop }) {
  return (
    <Cautions title="Before you open it" cautions={cautionsFor(cellType.kind, prop)} reminder={REMINDER} />
  );
}

type LogListProps = { entries: LogEntry[]; site: Site; onUndo: (entryId: string) => void };

/** The newest are in sight, the rest a tap away. */
const LOG_IN_SIGHT = 4;

function LogList({ entries, site, onUndo }: LogListProps) {
  const lines = (some: LogEntry[]) => (
    <ol>
      {some.map((entry) => (
        <LogLine key={entry.id} entry={entry} timeZone={site.timeZone} onUndo={onUndo} />
      ))}
    </ol>
  );
  return (
    <section class="log" aria-labelledby="log-title">
      <h2 id="log-title">Log</h2>
      {entries.length === 0 && <p class="soft">Nothing recorded yet.</p>}
      {lines(entries.slice(0, LOG_IN_SIGHT))}
      {entries.length > LOG_IN_SIGHT && (
        <details>
          <summary>Earlier: {entries.length - LOG_IN_SIGHT}</summary>
          {lines(entries.slice(LOG_IN_SIGHT))}
        </details>
      )}
    </section>
  );
}

type LogLineProps = { entry: LogEntry; timeZone: string; onUndo: (entryId: string) => void };

function LogLine({ entry, timeZone, onUndo }: LogLineProps) {
  const when = shortMomentWords(Date.parse(entry.at), timeZone);
  return (
    <li>
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
}
