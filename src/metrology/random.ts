/**
 * Repeatable streams of standard normal numbers.
 *
 * Uniform bits: xoshiro128++ (D. Blackman, S. Vigna, "Scrambled linear pseudorandom number generators", ACM
 * Transactions on Mathematical Software 47 (2021) 36), period 2¹²⁸ − 1, made for 32-bit arithmetic. Stream k of a seed
 * starts k · 2⁶⁴ steps on, so that streams cannot overlap and a stream does not depend on who draws the others.
 * Normals: the ziggurat of G. Marsaglia and W. W. Tsang (Journal of Statistical Software 5 (2000) 8) with 256 layers,
 * with all 53 bits of the double in each draw, and layer and position from different bits (J. A. Doornik 2005, *from
 * memory*).
 */

/** x⁽²⁶⁴⁾ modulo the generator's characteristic polynomial, lowest power first; the authors' constants. */
const JUMP = [0x8764000b, 0xf542d2d3, 0x6fa035c3, 0x77f2db5b] as const;

/** State of one stream: four words, never all zero. Drawing from it changes it. */
export type Stream = Int32Array;

/** Stream number `index` (0, 1, 2 …) of `seed`, a non-negative safe integer. */
export function streamOf(seed: number, index: number): Stream {
  const stream = new Int32Array(4);
  // SplitMix64, as the authors advise, spreads any seed, 0 included, over the state.
  let counter = BigInt(seed);
  for (let word = 0; word < 4; word += 2) {
    counter = BigInt.asUintN(64, counter + 0x9e3779b97f4a7c15n);
    let z = counter;
    z = BigInt.asUintN(64, (z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n);
    z = BigInt.asUintN(64, (z ^ (z >> 27n)) * 0x94d049bb133111ebn);
    z ^= z >> 31n;
    stream[word] = Number(BigInt.asIntN(32, z));
    stream[word + 1] = Number(BigInt.asIntN(32, z >> 32n));
  }
  for (let jumps = 0; jumps < index; jumps++) jump(stream);
  return stream;
}

/** The next 32 bits, as a signed integer. */
export function nextBits(s: Stream): number {
  const s0 = s[0]!;
  const s1 = s[1]!;
  const s2 = s[2]! ^ s0;
  const s3 = s[3]! ^ s1;
  const sum = (s0 + s[3]!) | 0;
  s[0] = s0 ^ s3;
  s[1] = s1 ^ s2;
  s[2] = s2 ^ (s1 << 9);
  s[3] = (s3 << 11) | (s3 >>> 21);
  return (((sum << 7) | (sum >>> 25)) + s0) | 0;
}

/** Moves a stream 2⁶⁴ steps on. */
export function jump(s: Stream): void {
  const sum = new Int32Array(4);
  for (const word of JUMP) {
    for (let bit = 0; bit < 32; bit++) {
      if ((word >>> bit) & 1) for (let i = 0; i < 4; i++) sum[i]! ^= s[i]!;
      nextBits(s);
    }
  }
  s.set(sum);
}

const LAYERS = 256;
/** Where the base layer ends and the tail begins, so that 256 layers of equal area fill the half under exp(−x²/2). */
const TAIL_START = 3.654152885361009;
const LAYER_AREA = 0.004928673233974655;

interface Ziggurat {
  /**
   * Right edges of the layers from the base up; the base's is that of a box of its area, and a last 0 closes the list.
   */
  readonly edges: Float64Array;
  /** The same, times 2⁻⁵²: what an integer position is multiplied by. */
  readonly scales: Float64Array;
  /** exp(−edge²/2). */
  readonly heights: Float64Array;
}

function buildZiggurat(): Ziggurat {
  const edges = new Float64Array(LAYERS + 1);
  const heights = new Float64Array(LAYERS + 1);
  const height = (x: number) => Math.exp((-x * x) / 2);
  edges[1] = TAIL_START;
  heights[1] = height(TAIL_START);
  edges[0] = LAYER_AREA / heights[1];
  for (let i = 2; i < LAYERS; i++) {
    heights[i] = heights[i - 1]! + LAYER_AREA / edges[i - 1]!;
    edges[i] = Math.sqrt(-2 * Math.log(heights[i]!));
  }
  heights[LAYERS] = 1;
  return { edges, scales: edges.map((edge) => edge * 2 ** -52), heights };
}

const { edges: EDGES, scales: SCALES, heights: HEIGHTS } = buildZiggurat();

/**
 * Fills `out` with independent standard normal numbers, 2⁻⁵² of a layer apart and, in the tail, out to 13 standard
 * deviations. The generator's state is kept in local variables, which halves the time; only the hundredth draw that
 * does not fall within its layer's box leaves the loop.
 */
export function fillNormals(stream: Stream, out: Float64Array): void {
  let s0 = stream[0]!;
  let s1 = stream[1]!;
  let s2 = stream[2]!;
  let s3 = stream[3]!;
  for (let i = 0; i < out.length; i++) {
    // Twice nextBits, in place.
    let sum = (s0 + s3) | 0;
    const low = (((sum << 7) | (sum >>> 25)) + s0) | 0;
    let shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = (s3 << 11) | (s3 >>> 21);
    sum = (s0 + s3) | 0;
    const high = (((sum << 7) | (sum >>> 25)) + s0) | 0;
    shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = (s3 << 11) | (s3 >>> 21);

    // A signed integer of 53 bits: 32 of the second word above the 21 highest of the first, whose lowest eight choose
    // the layer.
    const layer = low & 255;
    const x = (high * 2097152 + (low >>> 11)) * SCALES[layer]!;
    if (Math.abs(x) < EDGES[layer + 1]!) {
      out[i] = x;
      continue;
    }
    stream[0] = s0;
    stream[1] = s1;
    stream[2] = s2;
    stream[3] = s3;
    const beside = outsideBox(stream, layer, x);
    s0 = stream[0]!;
    s1 = stream[1]!;
    s2 = stream[2]!;
    s3 = stream[3]!;
    if (beside === null) i--;
    else out[i] = beside;
  }
  stream[0] = s0;
  stream[1] = s1;
  stream[2] = s2;
  stream[3] = s3;
}

/** What a draw beyond its layer's box comes to: a number under the curve, or null where it has to be drawn again. */
function outsideBox(stream: Stream, layer: number, x: number): number | null {
  if (layer === 0) return Math.sign(x) * tail(stream);
  const floor = HEIGHTS[layer]!;
  return floor + uniform(stream) * (HEIGHTS[layer + 1]! - floor) < Math.exp((-x * x) / 2) ? x : null;
}

/** A normal number beyond TAIL_START, by Marsaglia's exponential envelope (Technometrics 6 (1964) 101-102). */
function tail(stream: Stream): number {
  for (;;) {
    const beyond = -Math.log(uniform(stream)) / TAIL_START;
    if (-2 * Math.log(uniform(stream)) > beyond * beyond) return TAIL_START + beyond;
  }
}

/** A uniform number in (0, 1), neither end included, on a grid of 2⁻⁵². */
function uniform(stream: Stream): number {
  const low = nextBits(stream) >>> 12;
  return ((nextBits(stream) >>> 0) * 1048576 + low + 0.5) * 2 ** -52;
}
