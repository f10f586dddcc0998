/** The regression functions of the NIST StRD nonlinear sets, by name of the set. */
type Model = (b: ArrayLike<number>, x: number) => number;

const exponentials: Model = (b, x) => b[0]! * Math.exp(-b[1]! * x) + b[2]! * Math.exp(-b[3]! * x) + b[4]! * Math.exp(-b[5]! * x);
const gauss: Model = (b, x) =>
  b[0]! * Math.exp(-b[1]! * x) + b[2]! * Math.exp(-(((x - b[3]!) / b[4]!) ** 2)) + b[5]! * Math.exp(-(((x - b[6]!) / b[7]!) ** 2));
const cubics: Model = (b, x) => (b[0]! + x * (b[1]! + x * (b[2]! + x * b[3]!))) / (1 + x * (b[4]! + x * (b[5]! + x * b[6]!)));
const chwirut: Model = (b, x) => Math.exp(-b[0]! * x) / (b[1]! + b[2]! * x);
const wave = (x: number, period: number): number => (2 * Math.PI * x) / period;

export const NIST_MODELS: Record<string, Model> = {
  Bennett5: (b, x) => b[0]! * (b[1]! + x) ** (-1 / b[2]!),
  BoxBOD: (b, x) => b[0]! * (1 - Math.exp(-b[1]! * x)),
  Chwirut1: chwirut,
  Chwirut2: chwirut,
  DanWood: (b, x) => b[0]! * x ** b[1]!,
  ENSO: (b, x) =>
    b[0]! +
    b[1]! * Math.cos(wave(x, 12)) +
    b[2]! * Math.sin(wave(x, 12)) +
    b[4]! * Math.cos(wave(x, b[3]!)) +
    b[5]! * Math.sin(wave(x, b[3]!)) +
    b[7]! * Math.cos(wave(x, b[6]!)) +
    b[8]! * Math.sin(wave(x, b[6]!)),
  Eckerle4: (b, x) => (b[0]! / b[1]!) * Math.exp(-0.5 * ((x - b[2]!) / b[1]!) ** 2),
  Gauss1: gauss,
  Gauss2: gauss,
  Gauss3: gauss,
  Hahn1: cubics,
  Kirby2: (b, x) => (b[0]! + x * (b[1]! + x * b[2]!)) / (1 + x * (b[3]! + x * b[4]!)),
  Lanczos1: exponentials,
  Lanczos2: exponentials,
  Lanczos3: exponentials,
  MGH09: (b, x) => (b[0]! * (x * x + x * b[1]!)) / (x * x + x * b[2]! + b[3]!),
  MGH10: (b, x) => b[0]! * Math.exp(b[1]! / (x + b[2]!)),
  MGH17: (b, x) => b[0]! + b[1]! * Math.exp(-x * b[3]!) + b[2]! * Math.exp(-x * b[4]!),
  Misra1a: (b, x) => b[0]! * (1 - Math.exp(-b[1]! * x)),
  Misra1b: (b, x) => b[0]! * (1 - (1 + (b[1]! * x) / 2) ** -2),
  Misra1c: (b, x) => b[0]! * (1 - (1 + 2 * b[1]! * x) ** -0.5),
  Misra1d: (b, x) => (b[0]! * b[1]! * x) / (1 + b[1]! * x),
  Rat42: (b, x) => b[0]! / (1 + Math.exp(b[1]! - b[2]! * x)),
  Rat43: (b, x) => b[0]! / (1 + Math.exp(b[1]! - b[2]! * x)) ** (1 / b[3]!),
  Roszman1: (b, x) => b[0]! - b[1]! * x - Math.atan(b[2]! / (x - b[3]!)) / Math.PI,
  Thurber: cubics,
};
