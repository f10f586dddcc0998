import { existsSync } from 'node:fs';
import { join } from 'node:path';

/** Faces of the labels; each is several files, since the packages cut them by script. */
export const FACES = {
  name: { package: '@fontsource/besley', stem: 'besley', weight: 800 },
  strong: { package: '@fontsource/jetbrains-mono', stem: 'jetbrains-mono', weight: 700 },
  plain: { package: '@fontsource/jetbrains-mono', stem: 'jetbrains-mono', weight: 500 },
} as const;
export type Face = keyof typeof FACES;

const SUBSETS = ['latin', 'latin-ext', 'cyrillic', 'greek'] as const;
type Subset = (typeof SUBSETS)[number];

/** The packages' own cut (their `unicode-range`), as far as labels need it. */
const IN: Record<Subset, RegExp> = {
  latin: /[\u0000-\u00ff\u0131\u0152\u0153\u02bb\u02bc\u02c6\u02da\u02dc\u2000-\u206f\u20ac\u2122\u2191\u2193\u2212\u2215]/,
  'latin-ext': /[\u0100-\u02ba\u02bd-\u02c5\u02c7-\u02cc\u02ce-\u02d7\u02dd-\u02ff\u0304\u0308\u0329\u1d00-\u1dbf\u1e00-\u1e9f\u1ef2-\u1eff\u2020\u20a0-\u20ab\u20ad-\u20c0\u2113\u2c60-\u2c7f\ua720-\ua7ff]/,
  cyrillic: /[\u0301\u0400-\u045f\u0490\u0491\u04b0\u04b1\u2116]/,
  greek: /[\u0370-\u0377\u037a-\u037f\u0384-\u038a\u038c\u038e-\u03a1\u03a3-\u03ff]/,
};

/** Besley has neither Cyrillic nor Greek: those words are set in the other face. */
const INSTEAD: Partial<Record<Face, Face>> = { name: 'strong' };

const fileOf = (face: Face, subset: Subset) => {
  const { package: name, stem, weight } = FACES[face];
  return join(process.cwd(), 'node_modules', name, 'files', `${stem}-${subset}-${weight}-normal.woff`);
};

/** Every font there is, by the name it is used under. */
export function fontFiles(): Array<{ font: string; path: string }> {
  return (Object.keys(FACES) as Face[]).flatMap((face) => SUBSETS.map((subset) => ({ font: `${face}-${subset}`, path: fileOf(face, subset) })).filter(({ path }) => existsSync(path)));
}

export interface Run {
  font: string;
  text: string;
}

/** A line cut into runs that one font file can set. What no file has (pictures, other scripts) becomes a dot rather than a hole. */
export function runsOf(line: string, face: Face, has: ReadonlySet<string>): Run[] {
  const runs: Run[] = [];
  for (const letter of line.normalize('NFC')) {
    const subset = SUBSETS.find((item) => IN[item].test(letter));
    const other = INSTEAD[face];
    const font = subset && [`${face}-${subset}`, other && `${other}-${subset}`].find((name) => name !== undefined && has.has(name));
    const [set, text] = font ? [font, letter] : [`${face}-latin`, '·'];
    const last = runs.at(-1);
    if (last?.font === set) last.text += text;
    else runs.push({ font: set, text });
  }
  return runs;
}
