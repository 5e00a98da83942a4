import { useEffect, useRef, useState } from 'preact/hooks';
import type { Answer } from '../api/client.ts';
import type { Problem } from '../api/types.ts';

/** Something asked of the server: the last answer stays while a newer one is on its way or missing. */
export type Read<T> = {
  value: T | null;
  problem: Problem | null;
  loading: boolean;
  again: () => Promise<T | null>;
};

const lastAnswers = new Map<string, unknown>();

/** After a deed everything kept may be old. */
export function forgetAnswers(): void {
  lastAnswers.clear();
}

/**
 * Asks once per key and again on `again()`.
 * @param key what is asked, unique among all reads; null = do not ask yet
 */
export function useRead<T>(key: string | null, ask: () => Promise<Answer<T>>): Read<T> {
  const [state, setState] = useState<{
    key: string | null;
    value: T | null;
    problem: Problem | null;
    loading: boolean;
  }>({
    key: null,
    value: null,
    problem: null,
    loading: true,
  });
  const latest = useRef({ key, ask, turn: 0 });
  latest.current.key = key;
  latest.current.ask = ask;

  const again = async (): Promise<T | null> => {
    const asked = latest.current.key;
    if (asked === null) return null;
    latest.current.turn += 1;
    const turn = latest.current.turn;
    setState((old) => ({ ...old, loading: true }));
    const answer = await latest.current.ask();
    // A slower answer to an older question must not overwrite a newer one.
    if (turn !== latest.current.turn) return answer.ok ? answer.value : null;
    if (answer.ok) {
      lastAnswers.set(asked, answer.value);
      setState({ key: asked, value: answer.value, problem: null, loading: false });
      return answer.value;
    }
    setState((old) => ({ key: asked, value: old.value, problem: answer.problem, loading: false }));
    return null;
  };

  useEffect(() => {
    if (key === null) return;
    const kept = lastAnswers.get(key) as T | undefined;
    if (kept !== undefined) setState({ key, value: kept, problem: null, loading: true });
    void again();
  }, [key]);

  return { value: state.value, problem: state.problem, loading: state.loading, again };
}
