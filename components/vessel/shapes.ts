/** Outlines in a box of 100 × 120, the neck on the line x = 52.7, the base on y = 118. */
export interface VesselShape {
  /** Inside of the glass, closed at the neck; also the clip of what is in it. */
  outline: string;
  /** y of the rim that the bung sits on. */
  rim: number;
  neckHalf: number;
  /** Height of the space that liquid can fill, from the base. */
  depth: number;
  left: number;
  right: number;
  /** Where the tag's thread is tied. */
  tie: { x: number; y: number };
  /** Drawn inside the outline: ribs; beside it: a finger loop. */
  ribs: readonly string[];
  loop: string | null;
}

export const AXIS = 52.7;
export const BASE = 118;

export const SHAPES = {
  demijohn: {
    outline: 'M45.5 30V40C45.5 45 41.5 46.6 36.5 49.6C27 55 22 62 22 72V111.5A6.5 6.5 0 0 0 28.5 118H76.9A6.5 6.5 0 0 0 83.4 111.5V72C83.4 62 78.4 55 68.9 49.6C63.9 46.6 59.9 45 59.9 40V30',
    rim: 30,
    neckHalf: 7.2,
    depth: 66,
    left: 22,
    right: 83.4,
    tie: { x: 45.5, y: 39.5 },
    ribs: [],
    loop: 'M45.5 34.4C39.5 32.6 36.6 36 37.4 40C38 43 41 44 44.2 43.4',
  },
  carboy: {
    outline: 'M43.8 17V27C43.8 31.6 39 32.6 33 34.6C22.5 38 16.6 42.4 16.6 49V111.5A6.5 6.5 0 0 0 23.1 118H82.4A6.5 6.5 0 0 0 88.9 111.5V49C88.9 42.4 83 38 72.5 34.6C66.5 32.6 61.6 31.6 61.6 27V17',
    rim: 17,
    neckHalf: 8.9,
    depth: 78,
    left: 16.6,
    right: 88.9,
    tie: { x: 43.8, y: 26 },
    ribs: ['M16.6 58C30 61.4 75.5 61.4 88.9 58', 'M16.6 78C30 81.4 75.5 81.4 88.9 78', 'M16.6 98C30 101.4 75.5 101.4 88.9 98'],
    loop: null,
  },
  flask: {
    outline: 'M45.9 46V67L28.9 111.4C27.4 115.4 29.4 118 33 118H72.4C76 118 78 115.4 76.5 111.4L59.5 67V46',
    rim: 46,
    neckHalf: 6.8,
    depth: 62,
    left: 34,
    right: 71.4,
    tie: { x: 45.9, y: 55 },
    ribs: [],
    loop: null,
  },
} as const satisfies Record<string, VesselShape>;

export type VesselKind = keyof typeof SHAPES;

/** The bung: a black taper that stands a little above the rim. */
export const bungPath = ({ rim, neckHalf }: VesselShape) =>
  `M${AXIS - neckHalf - 1.4} ${rim - 4.8}H${AXIS + neckHalf + 1.4}L${AXIS + neckHalf - 1} ${rim + 6.2}H${AXIS - neckHalf + 1}Z`;

/** An airlock: up from the bung, over, down into its bend and up to the cap. `top` is the bung's top. */
export function airlockPaths(top: number): { tube: string; water: string } {
  const y = (offset: number) => (top + offset).toFixed(1);
  return {
    tube: `M${AXIS} ${y(0)}V${y(-7)}C${AXIS} ${y(-9.8)} 54 ${y(-10.8)} 56.6 ${y(-10.8)}S60.6 ${y(-9.5)} 60.6 ${y(-7)}V${y(-6)}C60.6 ${y(-3.5)} 62.5 ${y(-1.9)} 65.1 ${y(-1.9)}S69.6 ${y(-3.5)} 69.6 ${y(-6)}V${y(-20.5)}M65 ${y(-20.5)}H74.3`,
    water: `M60.8 ${y(-6.2)}H69.4C69.4 ${y(-3.6)} 67.6 ${y(-2.1)} 65.1 ${y(-2.1)}S60.8 ${y(-3.6)} 60.8 ${y(-6.2)}Z`,
  };
}

/** A blow-off tube to a jar with water at the vessel's right foot. */
export function blowOffPaths(top: number, right: number): { tube: string; jar: string; water: string; bubbles: { x: number; y: number; r: number }[] } {
  const jar = right + 4;
  const centre = jar + 9.2;
  const arch = top - 21.8;
  const middle = (AXIS + centre) / 2;
  return {
    tube: `M${AXIS} ${top}V${arch + 16}C${AXIS} ${arch + 5} ${middle - 10} ${arch} ${middle} ${arch}S${centre} ${arch + 6} ${centre} ${arch + 18}V111`,
    jar: `M${jar} 89.5V114.5A3 3 0 0 0 ${jar + 3} 117.5H${jar + 15.4}A3 3 0 0 0 ${jar + 18.4} 114.5V89.5`,
    water: `M${jar} 99H${jar + 18.4}V114.5A3 3 0 0 1 ${jar + 15.4} 117.5H${jar + 3}A3 3 0 0 1 ${jar} 114.5Z`,
    bubbles: [
      { x: jar + 4.8, y: 108.4, r: 1.6 },
      { x: jar + 12.8, y: 104, r: 2 },
    ],
  };
}

/** Foam with a scalloped top, standing `height` above the liquid at `y`; wider than the vessel, to be clipped by it. */
export function krausenPath(shape: VesselShape, y: number, height: number): { foam: string; edge: string } {
  const left = shape.left - 2;
  const width = shape.right - shape.left + 4;
  const scallops = 6;
  const step = width / scallops;
  const arcs = `q${(step / 2).toFixed(2)} ${(-step / 2.6).toFixed(2)} ${step.toFixed(2)} 0`.repeat(scallops);
  const edge = `M${left} ${(y - height).toFixed(2)}${arcs}`;
  return { edge, foam: `${edge}V${y}H${left}Z` };
}
