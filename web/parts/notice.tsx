import type { ComponentChildren } from 'preact';
import type { Problem } from '../api/types.ts';

/** Something went another way than hoped: what, why, and a way on. */
export function Trouble({ problem, onAgain }: { problem: Problem; onAgain?: () => void }) {
  return (
    <div class="notice notice-trouble" role="alert">
      <strong>{problem.title}.</strong> {problem.detail}
      {onAgain && (
        <button type="button" class="quiet" onClick={onAgain}>
          Try again
        </button>
      )}
    </div>
  );
}

/** Told to those who listen as well as to those who look. */
export function Status({ children }: { children: ComponentChildren }) {
  return (
    <div class="status" role="status">
      {children}
    </div>
  );
}

/** Standing in for what is on its way. */
export function Waiting({ what }: { what: string }) {
  return (
    <p class="waiting" aria-busy="true">
      Fetching {what} …
    </p>
  );
}

/** What a form as a whole has to say. */
export function FormTrouble({ text }: { text: string | null }) {
  return <div role="alert">{text && <p class="notice notice-trouble">{text}</p>}</div>;
}

/** A list of reminders that come with a deed. */
export function Cautions({
  title,
  cautions,
  reminder,
}: {
  title: string;
  cautions: string[];
  reminder: string;
}) {
  return (
    <aside class="cautions" aria-label={title}>
      <h3>{title}</h3>
      <ul>
        {cautions.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
      <p class="soft">{reminder}</p>
    </aside>
  );
}
