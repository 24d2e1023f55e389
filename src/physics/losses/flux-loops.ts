/** A half-loop still open: it left its turning point at `start` and has gathered `cost` since. */
interface Branch {
  readonly start: number;
  cost: number;
}

/**
 * Splits one period of a piecewise-linear waveform into its major and minor loops and sums over them
 *
 *   Σ_loops (Δ_loop/Δ)^rangeExponent · ∫_loop |d(B/Δ)/dφ|^slopeExponent dφ
 *
 * where Δ is the peak-to-peak value of the whole (`span`) and Δ_loop that of a loop. Relative to Δ, so that the sum does
 * not change with the scale of the waveform. A waveform that never moves has span 0 and sum 0; flat parts add nothing.
 *
 * A loop is what the waveform does from a turning point until it is back at that point's level, with the smaller loops inside
 * it taken out first: the separation of Venkatachalam et al. (IEEE COMPEL 2002), which starts at the lowest point and
 * takes a minor loop out wherever the rising part falls or the falling part rises. Written not as their recursion but with
 * one stack of open half-loops, as rainflow counting is (same loops), so that time grows with the points and not with
 * their square, however deep the loops nest. A loop closes as soon as its level is met, also where the level is an
 * extreme of the whole met more than once; so the sum does not depend on where the period is said to begin.
 *
 * `phase` increases over exactly 1, `value` ends where it began; equal lengths of at least two.
 */
export function loopSum(
  { phase, value }: { phase: readonly number[]; value: readonly number[] },
  slopeExponent: number,
  rangeExponent: number,
): { span: number; sum: number } {
  const segments = phase.length - 1;
  let lowest = 0;
  let highest = 0;
  for (let i = 1; i < segments; i++) {
    if (value[i]! < value[lowest]!) lowest = i;
    if (value[i]! > value[highest]!) highest = i;
  }
  const span = value[highest]! - value[lowest]!;
  if (span === 0) return { span, sum: 0 };

  const open: Branch[] = [{ start: value[lowest]!, cost: 0 }];
  let rising = true;
  let sum = 0;
  for (let n = 0; n < segments; n++) {
    const i = (lowest + n) % segments;
    const to = value[i + 1]!;
    let from = value[i]!;
    if (to === from) continue;
    const rise = Math.abs(to - from);
    const duration = phase[i + 1]! - phase[i]!;
    // ∫ |d(B/Δ)/dφ|^slopeExponent dφ of the whole piece; a part of it costs as it rises, its slope being constant.
    const cost = (rise / span / duration) ** slopeExponent * duration;
    if (to > from !== rising) {
      open.push({ start: from, cost: 0 });
      rising = !rising;
    }
    // The half-loop before this one started at a level: once that is reached again, the two are a whole loop.
    for (let inner = open.at(-2); inner && (rising ? to >= inner.start : to <= inner.start); inner = open.at(-2)) {
      const outgoing = open.pop()!;
      open.pop();
      const gathered = inner.cost + outgoing.cost + cost * (Math.abs(inner.start - from) / rise);
      sum += gathered * (Math.abs(inner.start - outgoing.start) / span) ** rangeExponent;
      from = inner.start;
      // What was open before them goes on from here; where none was, the period has come back to its lowest point.
      if (open.length === 0) {
        open.push({ start: from, cost: 0 });
        rising = true;
      }
    }
    open.at(-1)!.cost += cost * (Math.abs(to - from) / rise);
  }
  return { span, sum };
}
