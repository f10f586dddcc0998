import type { VESSEL_KINDS } from '@/lib/contracts/batches';
import type { Neck, Stage } from '@/lib/core/types';

/** How far the drink has cleared. */
export type Clearness = 'hazy' | 'clearing' | 'bright';
/** What has settled on the bottom. */
export type Lees = 'none' | 'thin' | 'thick';

/** All that is drawn of a vessel; every part of it comes from the log. */
export interface VesselState {
  kind: (typeof VESSEL_KINDS)[number];
  neck: Neck;
  /** Share of the vessel that is filled, 0 to 1; null: an empty place. */
  level: number | null;
  /** A name of DRINK_COLOURS or `#rrggbb`. */
  drink: string;
  clearness: Clearness;
  krausen: boolean;
  lees: Lees;
  tag: number | null;
  /** The sensor is silent: the truth is not known. */
  silent: boolean;
}

const NECK_WORDS: Record<Neck, string> = { blow_off: 'blow-off tube to a jar', airlock: 'airlock with water', bung: 'bung', open: 'open neck' };
const LEES_WORDS: Record<Lees, string | null> = { none: null, thin: 'thin lees', thick: 'on its lees' };

/** The drawing in words, for those who do not see it. */
export function describeVessel(vessel: VesselState): string {
  if (vessel.level === null) return `Empty ${vessel.kind}`;
  const parts = [
    `${vessel.kind[0]!.toUpperCase()}${vessel.kind.slice(1)}${vessel.tag === null ? '' : ` with tag ${vessel.tag}`}`,
    NECK_WORDS[vessel.neck],
    `${Math.round(vessel.level * 100)} % full, ${vessel.clearness}`,
    vessel.krausen ? 'krausen' : null,
    LEES_WORDS[vessel.lees],
    vessel.silent ? 'sensor silent' : null,
  ];
  return parts.filter((part) => part !== null).join(', ');
}

interface Logged {
  vessel_kind: VesselState['kind'];
  neck: Neck;
  volume_l: number;
  vessel_l: number;
  drink_colour: string;
  tag: number | null;
  pitched_at: string | null;
  assessment: { stage: Stage; calls: { sensor: { verdict: string; kind: string | null } } } | null;
}

/** Foam stands while the fall is quickest; what settles shows once it slows. */
const DRAWN: Record<Stage, Pick<VesselState, 'clearness' | 'krausen' | 'lees'>> = {
  not_started: { clearness: 'hazy', krausen: false, lees: 'none' },
  lag: { clearness: 'hazy', krausen: false, lees: 'none' },
  accelerating: { clearness: 'hazy', krausen: true, lees: 'none' },
  peak: { clearness: 'hazy', krausen: true, lees: 'none' },
  slowing: { clearness: 'hazy', krausen: false, lees: 'thin' },
  terminal: { clearness: 'clearing', krausen: false, lees: 'thick' },
  unknown: { clearness: 'hazy', krausen: false, lees: 'none' },
};

/**
 * A vessel as its batch's record tells it. A racking after the fall had stopped
 * leaves the lees behind and the drink bright.
 */
export function vesselOf(batch: Logged, rackedWhenFinished = false): VesselState {
  const stage = batch.assessment?.stage ?? (batch.pitched_at ? 'unknown' : 'not_started');
  const drawn = stage === 'terminal' && rackedWhenFinished ? ({ clearness: 'bright', krausen: false, lees: 'none' } as const) : DRAWN[stage];
  const sensor = batch.assessment?.calls.sensor;
  return {
    kind: batch.vessel_kind,
    neck: batch.neck,
    level: Math.min(1, batch.volume_l / batch.vessel_l),
    drink: batch.drink_colour,
    ...drawn,
    tag: batch.tag,
    silent: sensor?.kind === 'silent' && (sensor.verdict === 'yes' || sensor.verdict === 'hold'),
  };
}
