import type { VNode } from 'preact';
import { useLayoutEffect, useRef, useState } from 'preact/hooks';

/** Measures the room a drawing has and draws it for that width, so that its words keep their size on a phone. */
export function FitWidth({ draw, least = 260 }: { draw: (width: number) => VNode; least?: number }) {
  const room = useRef<HTMLDivElement>(null);
  const [width, setWidth] = useState<number | null>(null);
  useLayoutEffect(() => {
    const element = room.current;
    if (!element) return;
    const measure = () => setWidth(Math.max(least, Math.floor(element.clientWidth)));
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, [least]);
  return (
    <div class="fit-width" ref={room}>
      {width === null ? null : draw(width)}
    </div>
  );
}
