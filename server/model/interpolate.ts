/** Straight-line look-up in a table with ascending `xs`, held at the ends. */
export function interpolate(xs: readonly number[], ys: readonly number[], x: number): number {
  const last = xs.length - 1;
  if (x <= xs[0]!) return ys[0]!;
  if (x >= xs[last]!) return ys[last]!;
  let i = 1;
  while (xs[i]! < x) i += 1;
  const share = (x - xs[i - 1]!) / (xs[i]! - xs[i - 1]!);
  return ys[i - 1]! + share * (ys[i]! - ys[i - 1]!);
}

/** The x at which a falling table reaches y, held at the ends. */
export function interpolateFalling(xs: readonly number[], ys: readonly number[], y: number): number {
  const last = ys.length - 1;
  if (y >= ys[0]!) return xs[0]!;
  if (y <= ys[last]!) return xs[last]!;
  let i = 1;
  while (ys[i]! > y) i += 1;
  const share = (ys[i - 1]! - y) / (ys[i - 1]! - ys[i]!);
  return xs[i - 1]! + share * (xs[i]! - xs[i - 1]!);
}
