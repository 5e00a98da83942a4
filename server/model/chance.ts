/**
 * Standard normal distribution function.
 * Source: Hart, Computer Approximations (1968), algorithm 5666, in the double-precision form of West (2005).
 * Good to about 1e-15; 0 and 1 beyond 37 standard deviations.
 */
export function normalCdf(z: number): number {
  const x = Math.abs(z);
  if (x > 37) return z > 0 ? 1 : 0;
  const bell = Math.exp((-x * x) / 2);
  let tail: number;
  if (x < 7.07106781186547) {
    let top = 0.0352624965998911 * x + 0.700383064443688;
    top = top * x + 6.37396220353165;
    top = top * x + 33.912866078383;
    top = top * x + 112.079291497871;
    top = top * x + 221.213596169931;
    top = top * x + 220.206867912376;
    let bottom = 0.0883883476483184 * x + 1.75566716318264;
    bottom = bottom * x + 16.064177579207;
    bottom = bottom * x + 86.7807322029461;
    bottom = bottom * x + 296.564248779674;
    bottom = bottom * x + 637.333633378831;
    bottom = bottom * x + 793.826512519948;
    bottom = bottom * x + 440.413735824752;
    tail = (bell * top) / bottom;
  } else {
    tail = bell / (x + 1 / (x + 2 / (x + 3 / (x + 4 / (x + 0.65))))) / 2.506628274631;
  }
  return z > 0 ? 1 - tail : tail;
}

/** The z below which a share 0 < p < 1 of the standard normal lies, by bisection on `normalCdf` to 1e-12. */
export function normalQuantile(p: number): number {
  let low = -38;
  let high = 38;
  while (high - low > 1e-12) {
    const middle = (low + high) / 2;
    if (normalCdf(middle) < p) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Half-width of an 80 % range in standard deviations. */
export const EIGHTY_PERCENT_Z = 1.2815515655446004;
