import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { inOrder } from './order';

/** Faces of the labels; each is several files, since the packages cut them by script. */
export const FACES = {
  name: { package: '@fontsource/besley', stem: 'besley', weight: 800 },
  strong: { package: '@fontsource/jetbrains-mono', stem: 'jetbrains-mono', weight: 700 },
  plain: { package: '@fontsource/jetbrains-mono', stem: 'jetbrains-mono', weight: 500 },
} as const;
export type Face = keyof typeof FACES;

const SUBSETS = ['latin', 'latin-ext', 'cyrillic', 'greek'] as const;
type Subset = (typeof SUBSETS)[number];

/** Scripts that neither face has, each in a face of its own; `scale` keeps what stands above and below its line inside the line of the others. */
const OTHER = {
  arabic: { package: '@fontsource/noto-naskh-arabic', stem: 'noto-naskh-arabic', weight: { name: 700, strong: 700, plain: 500 }, scale: 0.8 },
  hebrew: { package: '@fontsource/noto-sans-hebrew', stem: 'noto-sans-hebrew', weight: { name: 800, strong: 700, plain: 500 }, scale: 1 },
} as const;
type Script = keyof typeof OTHER;
const SCRIPTS = Object.keys(OTHER) as Script[];
const IN_SCRIPT: Record<Script, RegExp> = {
  arabic: /[\u0600-\u06ff\u0750-\u077f\u0870-\u08ff\ufb50-\ufdff\ufe70-\ufefc]/,
  hebrew: /[\u0590-\u05ff\ufb1d-\ufb4f]/,
};

/** The packages' own cut (their `unicode-range`), as far as labels need it. */
const IN: Record<Subset, RegExp> = {
  latin: /[\u0000-\u00ff\u0131\u0152\u0153\u02bb\u02bc\u02c6\u02da\u02dc\u2000-\u206f\u20ac\u2122\u2191\u2193\u2212\u2215]/,
  'latin-ext': /[\u0100-\u02ba\u02bd-\u02c5\u02c7-\u02cc\u02ce-\u02d7\u02dd-\u02ff\u0304\u0308\u0329\u1d00-\u1dbf\u1e00-\u1e9f\u1ef2-\u1eff\u2020\u20a0-\u20ab\u20ad-\u20c0\u2113\u2c60-\u2c7f\ua720-\ua7ff]/,
  cyrillic: /[\u0301\u0400-\u045f\u0490\u0491\u04b0\u04b1\u2116]/,
  greek: /[\u0370-\u0377\u037a-\u037f\u0384-\u038a\u038c\u038e-\u03a1\u03a3-\u03ff]/,
};

/** Besley has neither Cyrillic nor Greek: those words are set in the other face. */
const INSTEAD: Partial<Record<Face, Face>> = { name: 'strong' };

const fileOf = (packageName: string, stem: string, subset: string, weight: number) => join(process.cwd(), 'node_modules', packageName, 'files', `${stem}-${subset}-${weight}-normal.woff`);

/** Every font there is, by the name it is used under. */
export function fontFiles(): Array<{ font: string; path: string }> {
  return (Object.keys(FACES) as Face[])
    .flatMap((face) => [
      ...SUBSETS.map((subset) => ({ font: `${face}-${subset}`, path: fileOf(FACES[face].package, FACES[face].stem, subset, FACES[face].weight) })),
      ...SCRIPTS.map((script) => ({ font: `${face}-${script}`, path: fileOf(OTHER[script].package, OTHER[script].stem, script, OTHER[script].weight[face]) })),
    ])
    .filter(({ path }) => existsSync(path));
}

export interface Run {
  font: string;
  text: string;
  /** Of the size asked for. */
  scale: number;
}

const turnsItself = (font: string): boolean => SCRIPTS.some((script) => font.endsWith(script));

/** The font that has a letter; null where none has. */
function fontOf(letter: string, face: Face, has: ReadonlySet<string>): { font: string; scale: number } | null {
  const script = SCRIPTS.find((item) => IN_SCRIPT[item].test(letter));
  if (script) return has.has(`${face}-${script}`) ? { font: `${face}-${script}`, scale: OTHER[script].scale } : null;
  const subset = SUBSETS.find((item) => IN[item].test(letter));
  const other = INSTEAD[face];
  const font = subset && [`${face}-${subset}`, other && `${other}-${subset}`].find((name) => name !== undefined && has.has(name));
  return font ? { font, scale: 1 } : null;
}

/**
 * A line cut into runs that one font file can set, as they stand from left to
 * right. What no file has (pictures, other scripts) becomes a dot rather than a hole.
 */
export function runsOf(line: string, face: Face, has: ReadonlySet<string>): Run[] {
  return inOrder(line.normalize('NFC')).flatMap(({ text, leftwards }) => {
    const runs: Run[] = [];
    for (const letter of text) {
      const found = fontOf(letter, face, has);
      const [font, set, scale] = found ? [found.font, letter, found.scale] : [`${face}-latin`, '·', 1];
      const last = runs.at(-1);
      // A face of those scripts turns its letters itself; of a Latin one, blanks and brackets are turned here.
      if (last?.font === font) last.text = leftwards && !turnsItself(font) ? set + last.text : last.text + set;
      else runs.push({ font, text: set, scale });
    }
    return leftwards ? runs.toReversed() : runs;
  });
}
