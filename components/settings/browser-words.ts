const BROWSERS: readonly [RegExp, string][] = [
  [/Edg(?:e|A|iOS)?\//, 'Edge'],
  [/OPR\//, 'Opera'],
  [/SamsungBrowser\//, 'Samsung Internet'],
  [/Firefox\/|FxiOS\//, 'Firefox'],
  [/Chrome\/|CriOS\//, 'Chrome'],
  [/Safari\//, 'Safari'],
];

const SYSTEMS: readonly [RegExp, string][] = [
  [/Android/, 'Android'],
  [/iPad/, 'iPad'],
  [/iPhone/, 'iPhone'],
  [/Windows/, 'Windows'],
  [/Mac OS X|Macintosh/, 'Mac'],
  [/Linux|X11/, 'Linux'],
];

const named = (list: readonly [RegExp, string][], text: string) => list.find(([pattern]) => pattern.test(text))?.[1];

/** `Firefox on Linux`: enough to know one's own phone from a stranger's. The order matters, since each browser also claims to be an older one. */
export function browserWords(userAgent: string): string {
  const browser = named(BROWSERS, userAgent);
  const system = named(SYSTEMS, userAgent);
  if (browser && system) return `${browser} on ${system}`;
  return browser ?? system ?? (userAgent.trim() === '' ? 'A program that did not say its name' : userAgent.slice(0, 80));
}
