import { useState } from 'preact/hooks';
import { api, onceKey } from '../api/client.ts';
import type { Prop } from '../api/types.ts';
import { markShape } from '../drawing/sign.ts';
import { FormTrouble } from '../parts/notice.tsx';
import { useShell } from '../state/shell.tsx';
import { SEEN, type Seen } from '../words/names.ts';

export type OnDone = (text: string, deed: { hints: string[]; undoId: string | null }) => Promise<void>;

/** One tap: how it looks now. */
export function SightingButtons({ prop, onDone }: { prop: Prop; onDone: OnDone }) {
  const { momentAt } = useShell();
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);

  const record = async (seen: Seen) => {
    if (busy) return;
    setBusy(true);
    const answer = await api.recordSighting(
      prop.id,
      { at: new Date(momentAt).toISOString(), seen },
      onceKey(),
    );
    if (answer.ok) {
      setTrouble(null);
      await onDone(`Recorded: seen ${seen}.`, { hints: answer.value.hints ?? [], undoId: answer.value.id });
    } else setTrouble(`${answer.problem.title}. ${answer.problem.detail}`);
    setBusy(false);
  };

  return (
    <section class="sighting" aria-labelledby="sighting-title">
      <h2 id="sighting-title">How does it look?</h2>
      <div class="sighting-row">
        {SEEN.map((seen) => (
          <button key={seen} type="button" aria-disabled={busy} onClick={() => void record(seen)}>
            <svg viewBox="-7 -7 14 14" width="18" height="18" aria-hidden="true" class="mark">
              {markShape(seen)}
            </svg>
            {seen}
          </button>
        ))}
      </div>
      <FormTrouble text={trouble} />
    </section>
  );
}
