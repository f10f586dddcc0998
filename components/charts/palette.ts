import { DRINK_COLOURS } from '@/lib/contracts/batches';

/** The tokens that a canvas draws with, as CSS colours of the theme in force. */
export interface Palette {
  night: boolean;
  sheet: string;
  lit: string;
  well: string;
  ink: string;
  ink2: string;
  ink3: string;
  on: string;
  rule: string;
  rule2: string;
  madder: string;
  ochre: string;
  green: string;
  mercury: string;
  range: string;
  drink: string;
  /** A drink so dark that ink on it needs a different share. */
  dark: boolean;
  /** Family and size of the chart's text. */
  font: string;
  textSize: number;
}

const DRINKS: Record<(typeof DRINK_COLOURS)[number], string> = {
  straw: '#D6C36A',
  gold: '#E6BD4E',
  amber: '#D99B3C',
  copper: '#B5652B',
  damson: '#8C2243',
  bramble: '#5A173C',
  stout: '#3B2218',
  pale: '#E9DFB8',
};

/** The keeper's choice as `#rrggbb`. */
export function drinkHex(choice: string): string {
  return DRINKS[choice as keyof typeof DRINKS] ?? (/^#[0-9a-fA-F]{6}$/.test(choice) ? choice : DRINKS.gold);
}

/** Relative luminance of an sRGB colour, 0 to 1 (WCAG 2.2, "relative luminance"). */
export function luminance(hex: string): number {
  const [red, green, blue] = [1, 3, 5].map((start) => {
    const share = parseInt(hex.slice(start, start + 2), 16) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red! + 0.7152 * green! + 0.0722 * blue!;
}

export const isDark = (hex: string): boolean => luminance(hex) < 0.1;

/** A colour let through by a share from 0 to 1. */
export const thin = (colour: string, share: number): string => `color-mix(in srgb, ${colour} ${Math.round(share * 100)}%, transparent)`;

/** How much of the drink's colour lies under a curve; the batch page keeps it lighter, for the dots on it. */
export function drinkShare(palette: Pick<Palette, 'night' | 'dark'>, page: boolean): number {
  if (palette.night) return palette.dark ? 0.61 : 0.36;
  if (!page) return 0.5;
  return palette.dark ? 0.27 : 0.42;
}

/** Reads the theme in force where the chart stands. */
export function readPalette(element: HTMLElement, drink: string): Palette {
  const style = getComputedStyle(element);
  const token = (name: string) => style.getPropertyValue(`--${name}`).trim() || 'currentColor';
  const hex = drinkHex(drink);
  const night = document.documentElement.dataset.theme === 'night';
  return {
    night,
    sheet: token('sheet'),
    lit: token('lit'),
    well: token('well'),
    ink: token('ink'),
    ink2: token('ink2'),
    ink3: token('ink3'),
    on: token('on'),
    rule: token('rule'),
    rule2: token('rule2'),
    madder: token('madder'),
    ochre: token('ochre'),
    green: token('green'),
    mercury: token('mercury'),
    range: token('range'),
    drink: night ? `color-mix(in oklab, ${hex} 70%, #77725F)` : hex,
    dark: isDark(hex),
    font: style.fontFamily,
    textSize: parseFloat(style.fontSize) || 12,
  };
}
