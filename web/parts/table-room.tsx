import type { ComponentChildren } from 'preact';

/** A wide table scrolls in its own room, so that the page never does sideways. */
export function TableRoom({ label, children }: { label: string; children: ComponentChildren }) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reachable by keyboard (WCAG 2.1.1)
    <section class="table-room" tabIndex={0} aria-label={label}>
      {children}
    </section>
  );
}
