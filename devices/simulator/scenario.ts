import type { DrinkKind, EventKind, Neck } from '@/lib/core/types';
import type { YeastTruth } from './ferment';
import type { SensorTraits } from './sensor';

/** Something that is done to the batch, a number of hours after the pitch. */
export interface ScenarioEvent {
  atH: number;
  kind: EventKind;
  /** What the log says; null is something done and not logged. */
  text: string | null;
  sugarG?: number;
  /** Fruit or candied pieces, g, of which `sugarShare` is sugar that comes out with a time constant of `releaseH`. */
  fruitG?: number;
  sugarShare?: number;
  releaseH?: number;
  volumeL?: number;
  /** Of what is added. A hydrometer `reading` takes its own from the truth. */
  gravity?: number;
  neck?: Neck;
  /** Assimilable nitrogen, g/L of the whole. */
  nitrogen?: number;
  /** Share of the cells that stay in the liquid when it leaves its lees. */
  cellsKept?: number;
  /** How much the float reads off after it was moved, points. */
  floatPoints?: number;
}

/** The room's mean temperature from an hour after the pitch on; the first begins at 0. */
export interface RoomStep {
  fromH: number;
  meanC: number;
}

/** A ferment and its sensor: what the keeper knows of it, and what is really the case. */
export interface Scenario {
  name: string;
  /** Name for the batch. */
  title: string;
  /** What it shows, one sentence. */
  shows: string;
  kind: DrinkKind;
  volumeL: number;
  vessel: { kind: 'demijohn' | 'carboy' | 'flask'; litres: number };
  /** One of the drink colours on offer. */
  colour: 'straw' | 'gold' | 'amber' | 'copper' | 'damson' | 'bramble' | 'stout' | 'pale';
  neck: Neck;
  /** What the packet promises. */
  packet: { attenuation: { min: number; max: number }; toleranceAbv: number; temperature: { minC: number; maxC: number } };
  /** True gravity at the pitch, the gravity with no sugar left, and assimilable nitrogen, g/L. */
  must: { gravity: number; dryGravity: number; nitrogen: number };
  yeast: Partial<YeastTruth>;
  room: { steps: readonly RoomStep[]; dayNightC: number };
  sensor: Partial<SensorTraits>;
  events: readonly ScenarioEvent[];
  /** Age, hours, at which it shows what it is for; all that is done to it lies before. */
  ageH: number;
}
