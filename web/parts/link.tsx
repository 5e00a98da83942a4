import type { ComponentChildren } from 'preact';
import { useShell } from '../state/shell.tsx';

type LinkProps = {
  path: string;
  children: ComponentChildren;
  class?: string;
  current?: boolean;
  label?: string;
};

/** A link within the pages: keeps the chosen site and moment, and opens in a new tab like any other when asked to. */
export function Link({ path, children, class: className, current, label }: LinkProps) {
  const { to, go } = useShell();
  const address = to(path);
  return (
    <a
      href={address}
      class={className}
      aria-current={current ? 'page' : undefined}
      aria-label={label}
      onClick={(event) => {
        if (event.ctrlKey || event.metaKey || event.shiftKey || event.altKey || event.button !== 0) return;
        event.preventDefault();
        go(address);
      }}
    >
      {children}
    </a>
  );
}
