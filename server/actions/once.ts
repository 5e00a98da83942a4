import { DAY_MS } from '../model/evening.ts';
import { dropReplaysBefore, findReplay, saveReplay } from '../store/replays.ts';
import type { Deps } from './deps.ts';
import { Refusal } from './refusal.ts';

/** What the asker said to know this request by, and a hash of what it asked. */
export type Replay = { key: string; bodyHash: string };
export type Answer = { status: number; body: string };

// Phones come back late: a swap noted on a round may be sent again weeks later.
const KEPT_DAYS = 60;

/**
 * Does a deed at most once. The first answer is kept in the same transaction as the deed; the same request again
 * gets that answer, whatever has happened since.
 * @param deps what a deed needs
 * @param options.replay null = not asked for: the deed is simply done
 * @param options.deed its transaction becomes part of this one
 * @param options.answer writes the answer from what the deed gave
 * @throws Refusal 'replay-differs' when the key came before with another body
 */
export function once<T>(
  deps: Deps,
  options: { replay: Replay | null; deed: () => T; answer: (done: T) => Answer },
): Answer & { replayed: boolean } {
  const { replay } = options;
  return deps.store.transact((db) => {
    const earlier = replay && findReplay(db, replay.key);
    if (replay && earlier) {
      if (earlier.bodyHash !== replay.bodyHash) throw differs();
      return { status: earlier.status, body: earlier.body, replayed: true };
    }
    const answer = options.answer(options.deed());
    if (replay) {
      const at = deps.clock.now();
      saveReplay(db, { ...replay, ...answer, at });
      dropReplaysBefore(db, at - KEPT_DAYS * DAY_MS);
    }
    return { ...answer, replayed: false };
  });
}

function differs(): Refusal {
  return new Refusal('replay-differs', [
    {
      field: 'Idempotency-Key',
      message:
        'This key came before with a different body, so nothing was recorded. Send the first body again to get its answer, or a new key for a new entry.',
    },
  ]);
}
