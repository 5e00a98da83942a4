import { eq, lt } from 'drizzle-orm';
import type { Instant } from '../model/evening.ts';
import type { Db } from './open.ts';
import { replays } from './schema.ts';

/** The first answer to a request, kept so that a repeat gets the same. */
export type Replay = {
  /** Method, path and the caller's key, up to 600 characters. */
  key: string;
  bodyHash: string;
  status: number;
  body: string;
  at: Instant;
};

/** The first answer under this key, or null. */
export function findReplay(db: Db, key: string): Pick<Replay, 'bodyHash' | 'status' | 'body'> | null {
  const row = db
    .select({ bodyHash: replays.bodyHash, status: replays.status, body: replays.body })
    .from(replays)
    .where(eq(replays.key, key))
    .get();
  return row ?? null;
}

/** Keeps an answer; in the transaction of the deed it answers. Throws SqliteError when the key is taken. */
export function saveReplay(db: Db, replay: Replay): void {
  db.insert(replays).values(replay).run();
}

/** Forgets the answers given before a moment; how many they were. */
export function dropReplaysBefore(db: Db, at: Instant): number {
  return db.delete(replays).where(lt(replays.at, at)).run().changes;
}
