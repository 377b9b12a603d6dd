/**
 * JCAMP-DX 5.01 writer for predicted spectra and FIDs: one NTUPLES block with real and imaginary pages.
 * Sources: A. N. Davies, P. Lampen, Appl. Spectrosc. 47 (1993) 1093 (NMR); P. Lampen et al., Pure Appl. Chem. 71 (1999)
 * 1549 (version 5.01).
 */
import type { Result } from '../documents/result.js';
import { larmorMHz, nuclide } from '../nuclides/nuclides.js';
import { encodeDifdup } from './asdf.js';

/** What of a result an export holds. */
export type ResultPart = 'spectrum' | 'fid';

const CELSIUS_ZERO = 273.15;
const TEXT_LENGTH = 60;
/** Bits of the largest ordinate: the error stays below 2^-29 of it, and differences fit 32 bits. */
const ORDINATE_BITS = 29;
/** Exponent of the smallest normal double. */
const LEAST_EXPONENT = -1022;

/**
 * The spectrum of a result (abscissa in Hz from delta = 0, so that Hz / .OBSERVE FREQUENCY is ppm) or its FID (abscissa
 * in s). Title, origin and private records mark it as a prediction. Throws a RangeError for ordinates that are not finite.
 */
export function toJcamp(result: Result, part: ResultPart = 'spectrum'): string {
  const { records, table } = part === 'fid' ? fidBlock(result) : spectrumBlock(result);
  const lines = [...header(result, part), ...records, ...ntuples(table), '##END='];
  return lines.join('\r\n') + '\r\n';
}

interface Table {
  type: 'NMR SPECTRUM' | 'NMR FID';
  /** Names of the variables: abscissa, real, imaginary. */
  names: [string, string, string];
  unit: string;
  first: number;
  last: number;
  /** An abscissa in a table times this is the abscissa in `unit`. */
  xFactor: number;
  abscissa: (index: number) => string;
  real: Float64Array;
  imag: Float64Array;
}

function header({ system, experiment, report }: Result, part: ResultPart): string[] {
  const { symbol, mass } = splitIsotope(experiment.observe);
  const recipe = 'recipe' in experiment.sequence ? experiment.sequence.recipe : 'steps of its own';
  return [
    `##TITLE= PREDICTED: ${plainText(system.name)}`,
    '##JCAMP-DX= 5.01',
    `##DATA TYPE= ${part === 'fid' ? 'NMR FID' : 'NMR SPECTRUM'}`,
    '##DATA CLASS= NTUPLES',
    `##ORIGIN= Heddle ${report.engine}: calculated, not measured`,
    '##OWNER= not stated',
    `##.OBSERVE FREQUENCY= ${larmorMHz(experiment.observe, experiment.protonMHz)}`,
    `##.OBSERVE NUCLEUS= ^${mass}${symbol}`,
    `##.PULSE SEQUENCE= ${recipe}`,
    `##TEMPERATURE= ${+(experiment.temperature - CELSIUS_ZERO).toFixed(6)}`,
    '##$DATA SOURCE= PREDICTION',
    `##$ENGINE= heddle ${report.engine}`,
    `##$METHOD= ${plainText(report.method)}`,
    `##$PROTON FREQUENCY= ${experiment.protonMHz}`,
  ];
}

function spectrumBlock({ experiment, spectrum }: Result): { records: string[]; table: Table } {
  const mhz = larmorMHz(experiment.observe, experiment.protonMHz);
  const points = spectrum.real.length;
  const [first, last] = [spectrum.firstPpm * mhz, spectrum.lastPpm * mhz];
  const step = (last - first) / (points - 1);
  const digits = Math.max(0, 2 - Math.floor(Math.log10(Math.abs(step))));
  return {
    records: [
      `##.SHIFT REFERENCE= INTERNAL, ${referenceCompound(experiment.observe)}, 1, ${spectrum.firstPpm}`,
      '##$ORDINATE= NUCLEI PER HZ',
    ],
    table: {
      type: 'NMR SPECTRUM',
      names: ['FREQUENCY', 'SPECTRUM/REAL', 'SPECTRUM/IMAG'],
      unit: 'HZ',
      first,
      last,
      xFactor: 1,
      abscissa: (index) => (first + index * step).toFixed(digits),
      real: spectrum.real,
      imag: spectrum.imag,
    },
  };
}

function fidBlock({ experiment, fid }: Result): { records: string[]; table: Table } {
  return {
    records: [
      '##.ACQUISITION MODE= SIMULTANEOUS',
      '##.DELAY= (0, 0)',
      `##$CARRIER PPM= ${experiment.acquisition.centre}`,
    ],
    table: {
      type: 'NMR FID',
      names: ['TIME', 'FID/REAL', 'FID/IMAG'],
      unit: 'SECONDS',
      first: 0,
      last: fid.dwell * (fid.real.length - 1),
      xFactor: fid.dwell,
      abscissa: String,
      real: fid.real,
      imag: fid.imag,
    },
  };
}

function ntuples(table: Table): string[] {
  const points = table.real.length;
  const pages = [toIntegers(table.real), toIntegers(table.imag)];
  const scaled = (value: (integers: Int32Array) => number) =>
    pages.map((page) => value(page.integers) * page.factor).join(', ');
  const [low, high] = [Math.min(table.first, table.last), Math.max(table.first, table.last)];
  return [
    `##NTUPLES= ${table.type}`,
    `##VAR_NAME= ${table.names.join(', ')}, PAGE NUMBER`,
    '##SYMBOL= X, R, I, N',
    '##VAR_TYPE= INDEPENDENT, DEPENDENT, DEPENDENT, PAGE',
    '##VAR_FORM= AFFN, ASDF, ASDF, AFFN',
    `##VAR_DIM= ${points}, ${points}, ${points}, 2`,
    `##UNITS= ${table.unit}, ARBITRARY UNITS, ARBITRARY UNITS,`,
    `##FIRST= ${table.first}, ${scaled((y) => y[0])}, 1`,
    `##LAST= ${table.last}, ${scaled((y) => y[points - 1])}, 2`,
    `##MIN= ${low}, ${scaled((y) => y.reduce((a, b) => Math.min(a, b)))}, 1`,
    `##MAX= ${high}, ${scaled((y) => y.reduce((a, b) => Math.max(a, b)))}, 2`,
    `##FACTOR= ${table.xFactor}, ${pages[0].factor}, ${pages[1].factor}, 1`,
    '##PAGE= N=1',
    '##DATA TABLE= (X++(R..R)), XYDATA',
    ...encodeDifdup(pages[0].integers, table.abscissa),
    '##PAGE= N=2',
    '##DATA TABLE= (X++(I..I)), XYDATA',
    ...encodeDifdup(pages[1].integers, table.abscissa),
    `##END NTUPLES= ${table.type}`,
  ];
}

/** Integers and the power of two that turns them back: |value - integer factor| <= factor / 2. */
function toIntegers(values: Float64Array): { integers: Int32Array; factor: number } {
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (!Number.isFinite(largest)) throw new RangeError('JCAMP-DX holds finite ordinates only');
  const factor = largest === 0 ? 1 : 2 ** Math.max(Math.ceil(Math.log2(largest)) - ORDINATE_BITS, LEAST_EXPONENT);
  return { integers: Int32Array.from(values, (value) => Math.round(value / factor)), factor };
}

function splitIsotope(isotope: string): { mass: number; symbol: string } {
  const mass = nuclide(isotope).massNumber;
  return { mass, symbol: isotope.slice(String(mass).length) };
}

/** Delta = 0 of 1H, 13C and 29Si is TMS; of the others their own compound in the nuclide table. */
function referenceCompound(isotope: string): string {
  return ['1H', '13C', '29Si'].includes(isotope) ? 'TMS' : plainText(nuclide(isotope).reference).replace(/,/g, ';');
}

/** One short line of ASCII without the marks that mean something to JCAMP-DX. */
function plainText(text: string): string {
  const ascii = text
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/\s+/g, ' ')
    .replace(/[^ -~]/g, '?');
  return ascii
    .replace(/\$(?=\$)/g, '$ ')
    .replace(/##/g, '# #')
    .trim()
    .slice(0, TEXT_LENGTH);
}
