/** Pseudo-random normal values, the same every time: a multiplicative congruential generator and Box and Muller's transformation. */
export function normalSample(n: number, mean: number, deviation: number, seed: number): number[] {
  let x = 1 + seed * 7919;
  const uniform = () => {
    x = (48271 * x) % 2147483647;
    return x / 2147483647;
  };
  for (let i = 0; i < 20; i++) uniform();
  return Array.from({ length: n }, () => {
    const radius = Math.sqrt(-2 * Math.log(uniform()));
    return mean + deviation * radius * Math.cos(2 * Math.PI * uniform());
  });
}
