/**
 * Counts samples by their order: a sensor that runs steadily delivers one sample per period however late each arrives,
 * so only a lasting shift of the stamps against the count is a loss. (Rounding each stamp to the nearest period slips as
 * soon as the scatter nears half a period, and a slip looks like true scatter to the fold test.)
 */

/** An interval this long against the period may hide a loss, periods. Our choice: below it no whole sample fits. */
const LOSS_CANDIDATE_PERIODS = 1.35;
/** Samples looked at after a candidate: they outlast a delivery burst of half as many. */
const LOOK_AHEAD_SAMPLES = 32;
/** Cost of calling a loss, in periods of summed lateness: several samples must be explained by it. */
const LOSS_COST_PERIODS = 2;
/** Lateness of one sample counts at most this much, periods: delivery has a long tail. */
const LATENESS_LIMIT_PERIODS = 1.5;
/** The count starts at a calm stretch among this many first samples. */
const START_SEARCH_SAMPLES = 300;
/** Memory of the running lateness, samples. */
const LATENESS_MEMORY_SAMPLES = 16;
/** Samples over which the first estimate of the period is taken, and the share of such means that must lie closest together. */
const PERIOD_SPAN_SAMPLES = 16;
const DENSEST_SHARE = 0.4;

export interface SampleCount {
  /** Counter of each sample, strictly increasing, 0 first; length n. */
  readonly count: Int32Array;
  readonly periodS: number;
  /** Index of the first sample after each loss, and samples lost there. */
  readonly losses: readonly { readonly index: number; readonly lostCount: number }[];
}

export function median(values: ArrayLike<number>): number {
  const sorted = Float64Array.from(values).sort();
  const n = sorted.length;
  if (n === 0) throw new RangeError('median of no values');
  return n % 2 ? (sorted[n >> 1] as number) : ((sorted[n / 2 - 1] as number) + (sorted[n / 2] as number)) / 2;
}

/**
 * @param timeS stamps in order of delivery, s, not decreasing, length n >= 4
 * @returns counter, period (mean over the count) and losses
 */
export function countSamples(timeS: Float64Array): SampleCount {
  if (timeS.length < 4) throw new RangeError(`at least 4 stamps are needed, got ${timeS.length}`);
  let periodS = firstPeriod(timeS);
  let counted = countWith(timeS, periodS);
  for (let pass = 0; pass < 2; pass++) {
    periodS = periodFrom(timeS, counted.count);
    counted = countWith(timeS, periodS);
  }
  return { ...counted, periodS: periodFrom(timeS, counted.count) };
}

function firstPeriod(timeS: Float64Array): number {
  const n = timeS.length;
  const span = Math.min(PERIOD_SPAN_SAMPLES, Math.max(1, Math.floor(n / 4)));
  const means: number[] = [];
  const stride = Math.max(1, Math.floor(span / 4), Math.floor(n / 20_000));
  for (let i = 0; i + span < n; i += stride)
    means.push(((timeS[i + span] as number) - (timeS[i] as number)) / span);
  return densest(means);
}

/** Middle of the shortest interval that holds a share of the values: losses lengthen some spans and shorten none. */
function densest(values: readonly number[]): number {
  const sorted = Float64Array.from(values).sort();
  const held = Math.max(1, Math.ceil(DENSEST_SHARE * sorted.length));
  let best = 0;
  for (let i = 0; i + held <= sorted.length; i++)
    if (sorted[i + held - 1]! - sorted[i]! < sorted[best + held - 1]! - sorted[best]!) best = i;
  return (sorted[best]! + sorted[best + held - 1]!) / 2;
}

/** Least-squares period of stamps against counts, s. */
function periodFrom(timeS: Float64Array, count: Int32Array): number {
  const n = timeS.length;
  let meanT = 0;
  let meanK = 0;
  for (let i = 0; i < n; i++) {
    meanT += timeS[i] as number;
    meanK += count[i] as number;
  }
  meanT /= n;
  meanK /= n;
  let cross = 0;
  let square = 0;
  for (let i = 0; i < n; i++) {
    const k = (count[i] as number) - meanK;
    cross += k * ((timeS[i] as number) - meanT);
    square += k * k;
  }
  return cross / square;
}

/** Counts forwards and backwards from the calmest stretch near the start, where no loss can hide. */
function countWith(timeS: Float64Array, periodS: number): Omit<SampleCount, 'periodS'> {
  const n = timeS.length;
  const start = calmStart(timeS);
  const forward = countFrom(timeS.subarray(start), periodS);
  const mirrored = timeS
    .subarray(0, Math.min(n, start + LOOK_AHEAD_SAMPLES))
    .slice()
    .reverse();
  const backward = countFrom(
    mirrored.map((t) => -t),
    periodS,
  );
  const last = mirrored.length - 1;
  const total = (backward.count[last] as number) - (backward.count[last - start] as number);
  const count = new Int32Array(n);
  for (let i = 0; i < start; i++)
    count[i] = (backward.count[last] as number) - (backward.count[last - i] as number);
  for (let i = start; i < n; i++) count[i] = total + (forward.count[i - start] as number);
  const early = backward.losses
    .map(({ index, lostCount }) => ({ index: last - index + 1, lostCount }))
    .filter(({ index }) => index <= start)
    .reverse();
  const later = forward.losses.map(({ index, lostCount }) => ({ index: index + start, lostCount }));
  return { count, losses: [...early, ...later] };
}

/** Start of the window of samples, among the first few hundred, whose longest interval is shortest. */
function calmStart(timeS: Float64Array): number {
  const latest = Math.min(START_SEARCH_SAMPLES, timeS.length - LOOK_AHEAD_SAMPLES - 1);
  let best = 0;
  let least = Infinity;
  for (let s = 0; s <= latest; s += 4) {
    let longest = 0;
    for (let i = s + 1; i < s + LOOK_AHEAD_SAMPLES; i++)
      longest = Math.max(longest, (timeS[i] as number) - (timeS[i - 1] as number));
    if (longest < least) {
      least = longest;
      best = s;
    }
  }
  return best;
}

function countFrom(timeS: Float64Array, periodS: number): Omit<SampleCount, 'periodS'> {
  const n = timeS.length;
  const count = new Int32Array(n);
  const losses: { index: number; lostCount: number }[] = [];
  const ahead = new Float64Array(LOOK_AHEAD_SAMPLES);
  let lateness = startLateness(timeS, periodS);
  let k = 0;
  for (let i = 1; i < n; i++) {
    k++;
    if ((timeS[i] as number) - (timeS[i - 1] as number) > LOSS_CANDIDATE_PERIODS * periodS) {
      const width = Math.min(LOOK_AHEAD_SAMPLES, n - i);
      for (let j = 0; j < width; j++)
        ahead[j] = ((timeS[i + j] as number) - (k + j) * periodS - lateness) / periodS;
      const lost = lostBefore(ahead.subarray(0, width), timeS, i, periodS);
      if (lost > 0) {
        k += lost;
        losses.push({ index: i, lostCount: lost });
      }
    }
    count[i] = k;
    const error = (timeS[i] as number) - k * periodS - lateness;
    const gain = 1 / Math.min(i + 4, LATENESS_MEMORY_SAMPLES);
    lateness += gain * Math.max(-periodS, Math.min(periodS, error));
  }
  return { count, losses };
}

/**
 * Samples lost before index i, by dynamic programming over the stretches between loss candidates ahead: the shift may only
 * grow, growing costs, and each sample's remaining lateness costs. A candidate later on may explain the shift better.
 * @param latePeriods lateness of samples i, i+1... against a count without loss, periods
 */
function lostBefore(latePeriods: Float64Array, timeS: Float64Array, i: number, periodS: number): number {
  const stretches: Float64Array[] = [];
  let first = 0;
  for (let j = 1; j <= latePeriods.length; j++) {
    const isCandidate =
      j === latePeriods.length ||
      (timeS[i + j] as number) - (timeS[i + j - 1] as number) > LOSS_CANDIDATE_PERIODS * periodS;
    if (!isCandidate) continue;
    stretches.push(latePeriods.subarray(first, j));
    first = j;
  }
  const shifts = [...new Set([0, ...stretches.flatMap(shiftsNear)])]
    .filter((m) => m >= 0)
    .sort((a, b) => a - b);
  let costs = shifts.map(() => 0);
  // Backwards: costs[m] is the least cost of what follows when the shift so far is m.
  for (const stretch of stretches.reverse()) {
    const own = shifts.map((m) => stretchCost(stretch, m) + (costs[shifts.indexOf(m)] as number));
    let least = Infinity;
    const next = [...own];
    for (let m = shifts.length - 1; m >= 0; m--) {
      next[m] = Math.min(own[m] as number, least + LOSS_COST_PERIODS);
      least = Math.min(least, own[m] as number);
    }
    if (stretch === stretches[stretches.length - 1]) return shiftOf(shifts, own);
    costs = next;
  }
  return 0;
}

function shiftOf(shifts: readonly number[], own: readonly number[]): number {
  let best = 0;
  let least = own[0] as number;
  for (let m = 1; m < shifts.length; m++) {
    if ((own[m] as number) + LOSS_COST_PERIODS >= least) continue;
    least = (own[m] as number) + LOSS_COST_PERIODS;
    best = shifts[m] as number;
  }
  return best;
}

function shiftsNear(stretch: Float64Array): number[] {
  const middle = Math.round(median(stretch));
  return [middle - 1, middle, middle + 1];
}

function stretchCost(stretch: Float64Array, shift: number): number {
  let sum = 0;
  for (let j = 0; j < stretch.length; j++)
    sum += Math.min(LATENESS_LIMIT_PERIODS, Math.abs((stretch[j] as number) - shift));
  return sum;
}

function startLateness(timeS: Float64Array, periodS: number): number {
  const width = Math.min(LOOK_AHEAD_SAMPLES, timeS.length);
  return median(Float64Array.from({ length: width }, (_, i) => (timeS[i] as number) - i * periodS));
}
