import { drinkHex } from '@/components/charts/palette';

/** One vessel of the row: how far its haze has gone down. */
interface Stage {
  day: number;
  neck: 'tube' | 'airlock' | 'bung';
  /** y from which the drink is hazy; null: bright to the bottom. */
  haze: number | null;
  /** Between two lines of haze, px. */
  every: number;
  /** How much of the print the haze hides, 0 to 1. */
  cover: number;
  lees: number;
}

const STAGES: readonly Stage[] = [
  { day: 1, neck: 'tube', haze: 180, every: 5, cover: 0.72, lees: 0 },
  { day: 9, neck: 'airlock', haze: 212, every: 6, cover: 0.5, lees: 5 },
  { day: 24, neck: 'airlock', haze: 285, every: 10, cover: 0.36, lees: 13 },
  { day: 46, neck: 'airlock', haze: 376, every: 10, cover: 0.2, lees: 19 },
  { day: 90, neck: 'bung', haze: null, every: 1, cover: 0, lees: 24 },
];

const PRINT = ['day by day', 'the haze', 'goes down', 'and print', 'behind the', 'glass can', 'be read'];
const WIDTH = 149;
const LEVEL = 180;
const FLOOR = 438;
const OUTLINE = `M55.5 85V116C55.5 125 49 129.5 40 135C19 147 2 158 2 192V424A14 14 0 0 0 16 438H133A14 14 0 0 0 147 424V192C147 158 130 147 109 135C100 129.5 93.5 125 93.5 116V85`;

function NeckOf({ neck }: { neck: Stage['neck'] }) {
  return (
    <g fill="none" strokeWidth="3">
      {neck === 'tube' && (
        <>
          <path d="M180 390H214V430A6 6 0 0 1 208 436H164A6 6 0 0 1 158 430V390Z" fill="color-mix(in srgb, var(--mercury) 32%, var(--glass))" stroke="none" transform="translate(2.5 0)" />
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
  const clip = `settling-${stage.day}`;
  const hazeHeight = stage.haze === null ? 0 : FLOOR - stage.haze;
  return (
    <g transform={`translate(${x} 0)`} stroke="var(--ink)" strokeWidth="3" strokeLinejoin="round">
      <clipPath id={clip}>
        <path d={`${OUTLINE}Z`} />
      </clipPath>
      <g clipPath={`url(#${clip})`} stroke="none">
        <path d={`${OUTLINE}Z`} fill="var(--glass)" />
        <rect y={LEVEL} width="149" height={FLOOR - LEVEL} fill="color-mix(in oklab, var(--drink-fill) 74%, var(--lit))" />
        {PRINT.map((line, index) => (
          <text key={line} x="74.5" y={241 + index * 27} textAnchor="middle" fontFamily="var(--serif)" fontWeight="640" fontSize="20.5" fill="var(--ink)">
            {line}
          </text>
        ))}
        {stage.haze !== null && (
          <>
            <rect y={stage.haze} width="149" height={hazeHeight} fill="var(--drink-fill)" fillOpacity={stage.cover} />
            {Array.from({ length: Math.floor(hazeHeight / stage.every) }, (_, index) => (
              <rect key={index} y={stage.haze! + index * stage.every} width="149" height="2.6" fill="var(--drink-fill)" fillOpacity={0.6 + stage.cover / 2} />
            ))}
          </>
        )}
        <rect y={FLOOR - stage.lees} width="149" height={stage.lees} fill="color-mix(in oklab, var(--drink-fill) 40%, #20241a)" />
        {stage.neck === 'tube' && (
          <>
            <path d="M-3 160a10 8 0 0 0 20 0a10 8 0 0 0 20 0a10 8 0 0 0 20 0a10 8 0 0 0 20 0a10 8 0 0 0 20 0a10 8 0 0 0 20 0a10 8 0 0 0 20 0a10 8 0 0 0 20 0V180H-3Z" fill="var(--foam)" stroke="var(--ink)" strokeWidth="1.4" />
          </>
        )}
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
