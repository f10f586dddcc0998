import { useId } from 'react';
import { drinkHex } from '@/components/charts/palette';
import { describeVessel, type VesselState } from './describe';
import { airlockPaths, AXIS, BASE, blowOffPaths, bungPath, krausenPath, SHAPES, type VesselShape } from './shapes';

/** Below this height the tag's figure would be too small to read: the meta line names it instead. */
export const TAG_FROM_HEIGHT = 62;
const STROKE = 1.7;

interface VesselProps {
  vessel: VesselState;
  /** Height of the drawing's box, px; a carboy and a tube stand out of it a little. */
  height: number;
  /** Nothing for those who hear the page: the words beside it say the same. */
  silentPicture?: boolean;
  className?: string;
}

/** Settling haze: pale lines through the drink, even in pixels whatever the size. */
function HazeLines({ shape, level, wide, px }: { shape: VesselShape; level: number; wide: boolean; px: number }) {
  const every = (wide ? 7.8 : 4.5) * px;
  const lines: number[] = [];
  for (let y = level + every * 0.62; y < BASE - 2; y += every) lines.push(y);
  return (
    <g stroke="var(--glass)" strokeOpacity="0.5" strokeWidth={1.5 * px}>
      {lines.map((y) => (
        <line key={y} x1={shape.left - 8} x2={shape.right + 8} y1={y} y2={y} />
      ))}
    </g>
  );
}

/** The number on a tag of fixed size, tied to the neck. */
function Tag({ shape, tag, px }: { shape: VesselShape; tag: number; px: number }) {
  const text = String(tag);
  const height = 14.5 * px;
  const width = (8.5 + 7 * text.length) * px;
  const right = shape.left - 0.4 * px;
  const left = right - width;
  const top = Math.max(shape.tie.y + 6, 36);
  const cut = 4.5 * px;
  return (
    <g stroke="var(--ink)" fill="none" strokeWidth={1.2 * px}>
      <path d={`M${left + width * 0.72} ${top}C${left + width * 0.8} ${shape.tie.y} ${right + 6} ${shape.tie.y + 2} ${shape.tie.x} ${shape.tie.y}`} strokeWidth={px} />
      <path d={`M${left + cut} ${top}H${right}V${top + height}H${left}V${top + cut}Z`} fill="var(--lit)" />
      <text x={(left + right) / 2 + 0.6 * px} y={top + height / 2 + 4 * px} textAnchor="middle" fontFamily="var(--mono)" fontWeight="600" fontSize={11.5 * px} fill="var(--ink)" stroke="none">
        {text}
      </text>
    </g>
  );
}

function Neck({ vessel, shape }: { vessel: VesselState; shape: VesselShape }) {
  const top = shape.rim - 4.8;
  const rim = <path d={`M${AXIS - shape.neckHalf - 2.4} ${shape.rim}H${AXIS + shape.neckHalf + 2.4}`} />;
  if (vessel.neck === 'open') return rim;
  const airlock = vessel.neck === 'airlock' ? airlockPaths(top) : null;
  const tube = vessel.neck === 'blow_off' ? blowOffPaths(top, shape.right) : null;
  return (
    <>
      {airlock && <path d={airlock.water} fill="var(--mercury)" stroke="none" />}
      {tube && <path d={tube.water} fill="color-mix(in srgb, var(--mercury) 34%, var(--glass))" stroke="none" />}
      {airlock && <path d={airlock.tube} />}
      {tube && (
        <>
          <path d={tube.jar} />
          <path d={tube.tube} />
          {tube.bubbles.map((bubble) => (
            <circle key={bubble.x} cx={bubble.x} cy={bubble.y} r={bubble.r} strokeWidth="1" />
          ))}
        </>
      )}
      {rim}
      <path d={bungPath(shape)} fill="var(--ink)" strokeWidth="1" strokeLinejoin="round" />
    </>
  );
}

/** A vessel as the log knows it: kind, neck, level, drink, clearness, foam, lees, tag. */
export function Vessel({ vessel, height, silentPicture = false, className = '' }: VesselProps) {
  const clip = useId();
  const shape: VesselShape = SHAPES[vessel.kind];
  const px = 120 / height;
  const empty = vessel.level === null;
  const level = BASE - shape.depth * (vessel.level ?? 0);
  const krausen = vessel.krausen ? krausenPath(shape, level, Math.min(15, level - shape.rim - 18)) : null;
  const lees = vessel.lees === 'thick' ? 8.5 : vessel.lees === 'thin' ? 3.6 : 0;
  return (
    <svg
      viewBox="0 0 100 120"
      width={(height * 100) / 120}
      height={height}
      className={`drink shrink-0 overflow-visible ${className}`}
      style={{ ['--drink' as string]: drinkHex(vessel.drink) }}
      fill="none"
      stroke="var(--ink)"
      strokeWidth={Math.max(STROKE, 1.25 * px)}
      strokeLinecap="round"
      {...(silentPicture ? { 'aria-hidden': true } : { role: 'img', 'aria-label': describeVessel(vessel) })}
    >
      <clipPath id={clip}>
        <path d={`${shape.outline}Z`} />
      </clipPath>
      <g clipPath={`url(#${clip})`} stroke="none">
        <path d={`${shape.outline}Z`} fill="var(--glass)" />
        {!empty && (
          <>
            <rect x="0" y={level} width="110" height={BASE - level} fill="var(--drink-fill)" />
            {vessel.clearness !== 'bright' && <HazeLines shape={shape} level={level} wide={vessel.clearness === 'clearing'} px={px} />}
            {lees > 0 && <rect x="0" y={BASE - lees} width="110" height={lees} fill="color-mix(in oklab, var(--drink-fill) 52%, #14201a)" />}
            {krausen && (
              <>
                <path d={krausen.foam} fill="var(--foam)" />
                <path d={`${krausen.edge}M0 ${level}H110`} fill="none" stroke="var(--ink)" strokeWidth={px} />
              </>
            )}
          </>
        )}
        {shape.ribs.map((rib) => (
          <path key={rib} d={rib} fill="none" stroke="var(--ink)" strokeOpacity="0.55" strokeWidth={px} />
        ))}
      </g>
      <path d={shape.outline} strokeDasharray={empty || vessel.silent ? `${3.2 * px} ${2.4 * px}` : undefined} strokeLinecap={empty || vessel.silent ? 'butt' : 'round'} />
      {shape.loop && <path d={shape.loop} />}
      <Neck vessel={vessel} shape={shape} />
      {vessel.tag !== null && height >= TAG_FROM_HEIGHT && <Tag shape={shape} tag={vessel.tag} px={px} />}
    </svg>
  );
}

/** Nothing in it, or nothing known yet: a broken outline. */
export function EmptyVessel({ height, bung = true, className = '' }: { height: number; bung?: boolean; className?: string }) {
  return (
    <Vessel
      silentPicture
      className={className}
      height={height}
      vessel={{ kind: 'demijohn', neck: bung ? 'bung' : 'airlock', level: null, drink: 'straw', clearness: 'bright', krausen: false, lees: 'none', tag: null, silent: false }}
    />
  );
}
