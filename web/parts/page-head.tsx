import type { ComponentChildren } from 'preact';
import { useEffect, useRef } from 'preact/hooks';

let isFirst = true;

/** The heading of a page. It takes the focus when the page changes, so that keyboard and screen reader follow. */
export function PageHead({ title, children }: { title: string; children?: ComponentChildren }) {
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    // Not on arrival: there the browser's own order holds.
    if (isFirst) isFirst = false;
    else heading.current?.focus({ preventScroll: true });
  }, []);
  useEffect(() => {
    document.title = `${title} · Duskround`;
  }, [title]);
  return (
    <div class="page-head">
      <h1 ref={heading} tabIndex={-1}>
        {title}
      </h1>
      {children}
    </div>
  );
}
