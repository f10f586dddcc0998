/** The published sources and rules the core reckons with, each named once. */
import type { Source } from './how';

const published = (source: string): Source => ({ source, status: 'published' });
const practice = (source: string): Source => ({ source: `Common practice: ${source}`, status: 'common practice' });
const memory = (source: string): Source => ({ source, status: 'from memory' });
const ours = (source: string): Source => ({ source, status: 'our own rule' });

export const SOURCES = {
  icumsa: published('ICUMSA SPS-4 (1998); Bettin, Emmerich, Spieweck, Toth, Zuckerindustrie 123 (1998) 341-348: density of sucrose solutions'),
  iso1768: published('ISO 1768:1975: cubic expansion of hydrometer glass, 25e-6 per kelvin; ICUMSA SPS-4 density'),
  oivRefractometer: published('OIV-MA-AS2-02, Table I: temperature correction of the sucrose scale'),
  balling: published('Balling 1843: OE = 100 (2.0665 A + RE)/(100 + 1.0665 A), extracts and alcohol in % mass'),
  realExtract: memory('De Clerck, A Textbook of Brewing; ASBC: RE = 0.1808 OE + 0.8192 AE'),
  factor131: practice('strength from the fall of gravity times 131.25'),
  excise: published('HM Revenue and Customs, Excise Notice 226, sections 30.2 and 30.3: factor table; strength is truncated to 0.1 % vol'),
  eu1169: published('Regulation (EU) 1169/2011, Annex II point 12, Article 9(1)(k) and Annex XII'),
  oivSweetness: published('OIV International Standard for the Labelling of Wines 3.1.6: dry to 4 g/L, medium dry to 12, semi-sweet to 45'),
  weiss: published('Weiss, Marine Chemistry 2 (1974) 203-215: solubility and fugacity of CO2 in water'),
  carroll: published('Carroll, Slupsky, Mather, J. Phys. Chem. Ref. Data 20 (1991) 1201-1209: solubility of CO2 in water'),
  eec2676: published('Commission Regulation (EEC) 2676/90, Annex, chapter 37 (deleted 2005): CO2 content and pressure at 20 °C with alcohol and sugar terms'),
  stoichiometry: published('IUPAC standard atomic weights; C6H12O6 → 2 C2H5OH + 2 CO2'),
  pointsToVolumes: published('Balling’s split and sugar density tables: 1 point leaves 1.01 g/L of CO2, 0.51 volumes'),
  residual: practice('dissolved gas left is the saturation at the warmest temperature since the fermentation ended'),
  oivSulphite: published('OIV-MA-AS323-04C, Table I: pK of sulphur dioxide against strength and temperature'),
  sulphiteLimits: published('Delegated Regulation (EU) 2019/934, Annex I Part B: 150 mg/L red, 200 mg/L white and rosé, 50 more from 5 g/L of sugar'),
  dapOiv: published('OIV Code of Oenological Practices, Annex A.1: diammonium phosphate at most 0.3 g/L; nitrogen share by stoichiometry'),
  nitrogenDemand: practice('0.75 (low), 0.9 (medium), 1.25 (high) mg of nitrogen per g of sugar'),
  foam: ours('gas rule of the neck: foam stays under half the headspace (foaminess after Bikerman 1938)'),
  massBalance: published('Balling’s relation with mass, extract and alcohol conserved'),
  bottleTest: practice('two or three equal hydrometer readings some days apart before bottling'),
  practice: practice('usual in the trade'),
  ownRule: ours('a rule of this program'),
  told: { source: 'told by the person or measured', status: 'told' },
} as const satisfies Record<string, Source>;

export { practice, memory, ours, published };
