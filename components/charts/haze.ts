import { thin, type Palette } from './palette';

/** Haze is doubt: fine level lines, one CSS pixel in every three. */
export const HAZE_EVERY = 3;

/** Device pixels of one period and of its line, whole so that the lines stay level and even. */
export function hazeTile(ratio: number): { period: number; line: number } {
  const line = Math.max(1, Math.round(ratio));
  return { period: Math.max(line + 1, Math.round(HAZE_EVERY * ratio)), line };
}

/** A repeating pattern in device pixels, with the drink under its lines when asked. */
export function hazePattern(context: CanvasRenderingContext2D, palette: Palette, ratio: number, overDrink: boolean): CanvasPattern | string {
  const { period, line } = hazeTile(ratio);
  const tile = document.createElement('canvas');
  tile.width = 8;
  tile.height = period;
  const brush = tile.getContext('2d');
  if (!brush) return thin(palette.ink, 0.1);
  if (overDrink) {
    brush.fillStyle = thin(palette.drink, palette.night ? 0.26 : 0.24);
    brush.fillRect(0, 0, 8, period);
  }
  brush.fillStyle = thin(palette.ink, palette.night ? 0.3 : 0.22);
  brush.fillRect(0, 0, 8, line);
  return context.createPattern(tile, 'repeat') ?? thin(palette.ink, 0.1);
}
