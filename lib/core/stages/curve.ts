import type { BatchSetup } from '../types';
import { fitCurve, type CurveFit } from '../fit/map';
import { curvePrior, type Normal } from '../fit/priors';
import { binFrom } from '../series/bins';
import { medianInPlace } from '../series/order';
import type { Segment, Track } from '../series/track';

const EARLY_CHUNKS = 20;
const LATE_CHUNKS = 24;
const MOST = EARLY_CHUNKS + LATE_CHUNKS;
const tau = new Float64Array(MOST);
const g = new Float64Array(MOST);
const sd = new Float64Array(MOST);
const hours = new Float64Array(MOST);
const counts = new Float64Array(MOST);
const scratchG = new Float64Array(4096);

/**
 * Fits the attenuation curve of a segment to the record before `hour`: at most 44
 * chunk medians, finer over the last two fifths of the time. Early on the data
 * may shape the date but hardly the final gravity; where the fall is steep the
 * curve may be 0.3 days out.
 */
export function fitSegment(
  setup: BatchSetup,
  track: Track,
  segment: Segment,
  hour: number,
  fgPrior: Normal,
  og: Normal,
  start?: ArrayLike<number>,
): CurveFit | null {
  const { bins } = track;
  const first = binFrom(bins, Math.ceil(segment.from));
  const last = track.upTo(hour);
  if (last - first < 4) return null;
  const begin = bins.t[first]!;
  const end = bins.t[last - 1]!;
  const edge = begin + 0.6 * (end - begin);
  const tau0 = track.tauAt(segment.from);

  let n = 0;
  let i = first;
  for (let chunk = 0; chunk < MOST && i < last; chunk += 1) {
    const until =
      chunk < EARLY_CHUNKS
        ? begin + ((chunk + 1) / EARLY_CHUNKS) * (edge - begin)
        : edge + ((chunk - EARLY_CHUNKS + 1) / LATE_CHUNKS) * (end - edge) + (chunk === MOST - 1 ? 1 : 0);
    let kept = 0;
    let tauSum = 0;
    let timeSum = 0;
    while (i < last && bins.t[i]! <= until) {
      if (!bins.masked[i] && kept < scratchG.length) {
        scratchG[kept] = bins.g[i]!;
        tauSum += track.tau[i]!;
        timeSum += bins.t[i]!;
        kept += 1;
      }
      i += 1;
    }
    if (kept === 0) continue;
    tau[n] = tauSum / kept - tau0;
    hours[n] = timeSum / kept;
    g[n] = track.calibrate(medianInPlace(scratchG, 0, kept));
    counts[n] = kept;
    n += 1;
  }
  if (n < 4) return null;
  const drop = Math.max(5, og.mean - fgPrior.mean);
  for (let c = 0; c < n; c += 1) {
    const a = Math.max(0, c - 1);
    const b = Math.min(n - 1, c + 1);
    const rate = Math.abs(g[b]! - g[a]!) / Math.max(1, hours[b]! - hours[a]!) * 24;
    const u = Math.min(1, Math.max(0, (g[c]! - fgPrior.mean) / drop));
    sd[c] = Math.sqrt((0.6 + 10 * u) ** 2 + (0.3 * rate) ** 2 + 0.81 / counts[c]!);
  }
  return fitCurve({ n, tau, g, sd, hours }, curvePrior(setup.kind, og, fgPrior, segment.restarted), start);
}

