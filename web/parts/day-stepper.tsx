import { useShell } from '../state/shell.tsx';
import { instantOfStamp, momentWords, moveDays, wallStamp } from '../words/time.ts';

/** The moment shown, and the way to another day. The moment stands in the address, so it can be linked. */
export function DayStepper({ timeZone }: { timeZone: string }) {
  const { momentAt, place, to, go } = useShell();
  const path = location.pathname;
  const show = (at: number | null) => {
    const asOf = at === null ? null : new Date(at).toISOString().replace('.000Z', 'Z');
    go(to(path, { asOf }), { replace: place.asOf !== null });
  };
  const stamp = wallStamp(momentAt, timeZone);
  return (
    <span class="stepper">
      <button
        type="button"
        class="step"
        aria-label="A day earlier"
        onClick={() => show(moveDays(momentAt, -1, timeZone))}
      >
        <span aria-hidden="true">◀</span>
      </button>
      <label class="step-date">
        <span class="unseen">Shown as of</span>
        <input
          type="date"
          value={stamp.slice(0, 10)}
          onChange={(event) => {
            const at = instantOfStamp(`${event.currentTarget.value}${stamp.slice(10)}`, timeZone);
            if (at !== null) show(at);
          }}
        />
      </label>
      <button
        type="button"
        class="step"
        aria-label="A day later"
        onClick={() => show(moveDays(momentAt, 1, timeZone))}
      >
        <span aria-hidden="true">▶</span>
      </button>
      {place.asOf !== null && (
        <button type="button" class="quiet" onClick={() => show(null)}>
          Back to now
        </button>
      )}
    </span>
  );
}

/** On every page while the clock stands still or another moment was asked for. */
export function MomentStrip() {
  const { health, place, momentAt, site } = useShell();
  const fixedAt = health?.asOf ?? null;
  if (!site || (fixedAt === null && place.asOf === null)) return null;
  return (
    <section class="moment" aria-label="Moment shown">
      <p role="status">
        Shown as of <strong>{momentWords(momentAt, site.timeZone)}</strong>
        {fixedAt !== null && ': the clock of this demo stands still'}
      </p>
      <DayStepper timeZone={site.timeZone} />
    </section>
  );
}
