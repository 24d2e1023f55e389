/**
 * A root of the continuous `f` in [low, high], where f(low) and f(high) differ in sign (or one is zero), by Brent's method
 * (R. P. Brent, Algorithms for Minimization without Derivatives, 1973, ch. 4): never leaves the bracket, always ends, to
 * within `relativeTolerance` of the root's magnitude or one unit in its last place.
 * Throws `RangeError` where the bracket does not hold a sign change; callers check that first and say what it means.
 */
export function findRoot(f: (x: number) => number, low: number, high: number, relativeTolerance = 1e-15): number {
  let [a, b] = [low, high];
  let [fa, fb] = [f(a), f(b)];
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (Math.sign(fa) === Math.sign(fb) || !Number.isFinite(fa) || !Number.isFinite(fb)) {
    throw new RangeError(`no sign change between ${low} (${fa}) and ${high} (${fb})`);
  }
  let [c, fc] = [a, fa];
  let step = b - a;
  let previousStep = step;
  for (let iteration = 0; iteration < 500; iteration++) {
    if (Math.sign(fb) === Math.sign(fc)) {
      [c, fc] = [a, fa];
      step = previousStep = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      [a, b, c] = [b, c, b];
      [fa, fb, fc] = [fb, fc, fb];
    }
    const tolerance = Math.max(relativeTolerance, 2 * Number.EPSILON) * Math.abs(b) + Number.MIN_VALUE;
    const half = (c - b) / 2;
    if (Math.abs(half) <= tolerance || fb === 0) return b;
    if (Math.abs(previousStep) >= tolerance && Math.abs(fa) > Math.abs(fb)) {
      const s = fb / fa;
      let p: number;
      let q: number;
      if (a === c) {
        p = 2 * half * s;
        q = 1 - s;
      } else {
        const u = fa / fc;
        const r = fb / fc;
        p = s * (2 * half * u * (u - r) - (b - a) * (r - 1));
        q = (u - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      p = Math.abs(p);
      if (2 * p < Math.min(3 * half * q - Math.abs(tolerance * q), Math.abs(previousStep * q))) {
        previousStep = step;
        step = p / q;
      } else {
        step = previousStep = half;
      }
    } else {
      step = previousStep = half;
    }
    [a, fa] = [b, fb];
    b += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance;
    fb = f(b);
  }
  return b;
}
