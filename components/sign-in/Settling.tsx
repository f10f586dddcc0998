import { useId } from 'react';
import { drinkHex } from '@/components/charts/palette';

/** One vessel of the row: how far its haze has gone down. */
interface Stage {
  day: number;
  neck: 'tube' | 'airlock' | 'bung';
  /** y from which the drink is hazy; null: bright to the bottom. */
  haze: number | null;
  /** Gap between two lines of haze at its top and at its bottom, px: denser downwards. */
  gaps: { top: number; bottom: number };
  /** How much of the print the haze hides, 0 to 1. */
  cover: number;
  lees: number;
}

const STAGES: readonly Stage[] = [
  { day: 1, neck: 'tube', haze: 180, gaps: { top: 5.4, bottom: 4.6 }, cover: 0.78, lees: 0 },
  { day: 9, neck: 'airlock', haze: 212, gaps: { top: 15, bottom: 4.8 }, cover: 0.5, lees: 5 },
  { day: 24, neck: 'airlock', haze: 288, gaps: { top: 15, bottom: 5 }, cover: 0.42, lees: 13 },
  { day: 46, neck: 'airlock', haze: 380, gaps: { top: 16, bottom: 8 }, cover: 0.12, lees: 19 },
  { day: 90, neck: 'bung', haze: null, gaps: { top: 1, bottom: 1 }, cover: 0, lees: 24 },
];

/** Tops of the haze's lines, from its top down to the lees. */
function hazeLines({ haze, gaps }: Stage): number[] {
  if (haze === null) return [];
  const lines: number[] = [];
  for (let y = haze; y < FLOOR; y += gaps.top + (gaps.bottom - gaps.top) * Math.min(1, (y - haze) / (FLOOR - haze))) lines.push(Number(y.toFixed(1)));
  return lines;
}

const PRINT = ['day by day', 'the haze', 'goes down', 'and print', 'behind the', 'glass can', 'be read'];
const WIDTH = 149;
const LEVEL = 180;
const FLOOR = 438;
const CLEAR = 'color-mix(in oklab, var(--drink-fill) 66%, var(--lit))';
const MURK = 'color-mix(in oklab, var(--drink-fill) 92%, var(--ink))';
const LINE = 'color-mix(in oklab, var(--drink-fill) 86%, #c98a20)';
const OUTLINE = `M55.5 85V116C55.5 125 49 129.5 40 135C19 147 2 158 2 192V424A14 14 0 0 0 16 438H133A14 14 0 0 0 147 424V192C147 158 130 147 109 135C100 129.5 93.5 125 93.5 116V85`;

function NeckOf({ neck }: { neck: Stage['neck'] }) {
  return (
    <g fill="none" strokeWidth="3">
      {neck === 'tube' && (
        <>
          <path d="M160.5 392H195.5V430A6 6 0 0 1 189.5 436H166.5A6 6 0 0 1 160.5 430Z" fill="color-mix(in srgb, var(--mercury) 36%, var(--glass))" stroke="none" />
          <path d="M160.5 364V430A6 6 0 0 0 166.5 436H189.5A6 6 0 0 0 195.5 430V364" strokeWidth="2.5" />
          <path d="M74.5 72V36C74.5 10 94 4 118 4C152 4 177 20 177 58V420" />
          <circle cx="169" cy="396" r="2.6" strokeWidth="1.6" />
          <circle cx="184.5" cy="404" r="3.4" strokeWidth="1.6" />
        </>
      )}
      {neck === 'airlock' && (
        <>
          <path d="M95 52H114C114 58.5 110 62 104.5 62S95 58.5 95 52Z" fill="var(--mercury)" stroke="none" />
          <path d="M74.5 72V54C74.5 46 78 42 84.5 42S95 46 95 54C95 59.5 99 62 104.5 62S114 59.5 114 54V18M104 18H123" />
        </>
      )}
      <path d="M49 86H100" strokeWidth="4" />
      <path d="M53 72H96L91.5 97H57.500Z" fill="var(--ink)" stroke="var(--ink)" strokeWidth="1" />
    </g>
  );
}

function OneVessel({ stage, x }: { stage: Stage; x: number }) {
  const clip = useId();
  return (
    <g transform={`translate(${x} 0)`} stroke="var(--ink)" strokeWidth="3" strokeLinejoin="round">
      <clipPath id={clip}>
        <path d={`${OUTLINE}Z`} />
      </clipPath>
      <g clipPath={`url(#${clip})`} stroke="none">
        <path d={`${OUTLINE}Z`} fill="var(--glass)" />
        <rect y={LEVEL} width="149" height={FLOOR - LEVEL} fill={CLEAR} />
        {PRINT.map((line, index) => (
          <text key={line} x="74.5" y={241 + index * 27} textAnchor="middle" fontFamily="var(--serif)" fontWeight="640" fontSize="20.5" fill="var(--ink)">
            {line}
          </text>
        ))}
        {stage.haze !== null && <rect y={stage.haze} width="149" height={FLOOR - stage.haze} fill={MURK} fillOpacity={stage.cover} />}
        {hazeLines(stage).map((y) => (
          <rect key={y} y={y} width="149" height="2.6" fill={LINE} />
        ))}
        <rect y={FLOOR - stage.lees} width="149" height={stage.lees} fill="color-mix(in oklab, var(--drink-fill) 40%, #20241a)" />
        {stage.neck === 'tube' && <path d={`M0 164${'q10.6 -13.5 21.3 0'.repeat(7)}V${LEVEL}H0Z`} fill="var(--foam)" stroke="var(--ink)" strokeWidth="1.6" />}
        <path d={`M0 ${LEVEL}H149`} stroke="var(--ink)" strokeWidth="1.6" />
      </g>
      <path d={OUTLINE} fill="none" />
      <path d="M55 98C45 95 40 101 41 109C42 115 46 119 53 118" fill="none" strokeWidth="2.6" />
      <NeckOf neck={stage.neck} />
      <text x="74.5" y="470" textAnchor="middle" fontFamily="var(--mono)" fontWeight="600" fontSize="13" fill="var(--ink)" stroke="none">
        day {stage.day}
      </text>
    </g>
  );
}

/** The name, drawn: the same drink from the pitch until print can be read through it. */
export function Settling({ days, className = '' }: { days: readonly number[]; className?: string }) {
  const stages = STAGES.filter((stage) => days.includes(stage.day));
  const places = stages.reduce<number[]>((xs, stage, index) => [...xs, index === 0 ? 6 : xs[index - 1]! + WIDTH + (stages[index - 1]!.neck === 'tube' ? 60 : 19)], []);
  const width = places.at(-1)! + WIDTH + 40;
  return (
    <svg viewBox={`0 0 ${width} 480`} aria-hidden className={`drink w-full ${className}`} style={{ ['--drink' as string]: drinkHex('straw') }}>
      {stages.map((stage, index) => (
        <OneVessel key={stage.day} stage={stage} x={places[index]!} />
      ))}
      <path d={`M0 440H${width}`} stroke="var(--ink)" strokeWidth="3.5" />
    </svg>
  );
}
