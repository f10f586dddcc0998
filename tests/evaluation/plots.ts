import { normalBelow } from '@/lib/core/fit/priors';
import type { Score } from './score';

/** One line of a reliability picture: what was promised against what came true. */
interface ReliabilityLine {
  label: string;
  colour: string;
  /** Errors in units of the promised standard deviation. */
  z: readonly number[];
}

const SIZE = 360;
const MARGIN = 46;

/** Share of errors within the central interval of each promised share. */
function observed(z: readonly number[], promised: number): number {
  const inside = z.filter((value) => 2 * normalBelow(Math.abs(value)) - 1 <= promised).length;
  return z.length === 0 ? 0 : inside / z.length;
}

/** Reliability of intervals as SVG: on the diagonal they hold what they say, above it they are wider than needed. */
export function reliability(title: string, lines: readonly ReliabilityLine[]): string {
  const span = SIZE - 2 * MARGIN;
  const x = (share: number): string => (MARGIN + share * span).toFixed(1);
  const y = (share: number): string => (SIZE - MARGIN - share * span).toFixed(1);
  const parts = [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${SIZE}" height="${SIZE}" viewBox="0 0 ${SIZE} ${SIZE}" font-family="monospace" font-size="11">`,
    `<rect width="${SIZE}" height="${SIZE}" fill="#F1F5ED"/>`,
    `<text x="${MARGIN}" y="20" fill="#14201A">${title}</text>`,
    `<path d="M${x(0)} ${y(0)}L${x(1)} ${y(1)}" stroke="#8FA292" stroke-dasharray="4 3"/>`,
    `<path d="M${x(0)} ${y(1)}V${y(0)}H${x(1)}" fill="none" stroke="#14201A"/>`,
  ];
  for (const tick of [0.2, 0.4, 0.6, 0.8, 1]) {
    parts.push(`<text x="${x(tick)}" y="${SIZE - MARGIN + 16}" text-anchor="middle" fill="#415047">${tick * 100}</text>`);
    parts.push(`<text x="${MARGIN - 6}" y="${y(tick)}" text-anchor="end" dominant-baseline="middle" fill="#415047">${tick * 100}</text>`);
  }
  parts.push(`<text x="${SIZE / 2}" y="${SIZE - 10}" text-anchor="middle" fill="#415047">promised %, came true % upwards</text>`);
  lines.forEach((line, i) => {
    const points = Array.from({ length: 20 }, (_, k) => (k + 1) / 20.2).map((share) => `${x(share)} ${y(observed(line.z, share))}`);
    parts.push(`<path d="M${points.join('L')}" fill="none" stroke="${line.colour}" stroke-width="1.9"/>`);
    parts.push(`<text x="${MARGIN + 12}" y="${MARGIN + 14 * i}" fill="${line.colour}">${line.label} (${line.z.length})</text>`);
  });
  parts.push('</svg>');
  return parts.join('\n');
}

const COLOURS = ['#A3241C', '#7A5200', '#1D5B3D'];

export function pictures(score: Score): { name: string; svg: string }[] {
  const shares = [25, 50, 75] as const;
  return [
    {
      name: 'reliability-final-gravity.svg',
      svg: reliability('final gravity', shares.map((share, i) => ({ label: `at ${share} % of the time`, colour: COLOURS[i]!, z: score.forecasts[share].finalZ }))),
    },
    {
      name: 'reliability-date.svg',
      svg: reliability('date of the end', shares.map((share, i) => ({ label: `at ${share} % of the time`, colour: COLOURS[i]!, z: score.forecasts[share].dateZ }))),
    },
  ];
}
