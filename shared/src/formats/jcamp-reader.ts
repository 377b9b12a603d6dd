/**
 * Reads one-dimensional NMR spectra and FIDs from JCAMP-DX 4.24 to 6.00. The package jcampconverter takes the file apart
 * and scales the axes; the ordinate tables are decoded by `decodeTable`, which checks what that package passes over
 * (Y checks, missing ordinates, exponents, a repeat count after a check value).
 */
import { convert, type Entry, type Spectrum as JcampSpectrum } from 'jcampconverter';
import { decodeTable, TableError, type DecodedTable } from './asdf.js';

/** A file that can't be used; `record` names the labelled record that is wrong or missing, '' the file itself. */
export class JcampRefused extends Error {
  constructor(
    readonly record: string,
    message: string,
  ) {
    super(record === '' ? message : `${record}: ${message}`);
    this.name = 'JcampRefused';
  }
}

/** Evenly spaced data of one block. */
export interface JcampData {
  kind: 'spectrum' | 'fid';
  title: string;
  /** '1H', or '' when the file does not say. */
  isotope: string;
  observeMHz: number;
  /** First and last abscissa: ppm, highest first, for a spectrum; s for an FID. */
  first: number;
  last: number;
  real: Float64Array;
  imag?: Float64Array;
  /** False when no record ties the ppm axis to a reference, so that it is only Hz / MHz. */
  referenced: boolean;
  /** The file says itself that it was calculated. */
  predicted: boolean;
  /** What was unusual but no reason to refuse. */
  notes: string[];
}

/** Longest text read, in characters: a compressed table of two million points stays below. */
const MOST_CHARACTERS = 64 * 2 ** 20;

/** All one-dimensional NMR blocks of a file, at least one. Throws JcampRefused. */
export function readJcamp(text: string): JcampData[] {
  if (text.length > MOST_CHARACTERS)
    throw new JcampRefused('', `the file is longer than ${MOST_CHARACTERS / 2 ** 20} MiB`);
  const { skeleton, tables } = takeTables(text.replace(/\r\n?/g, '\n').replace(/^[ \t]+##/gm, '##'));
  const entries = convert(skeleton, {
    keepRecordsRegExp: /.*/,
    removeComments: true,
    noContour: true,
    keepSpectra: true,
  }).flatten;
  let next = 0;
  const blocks = entries.flatMap((entry) => {
    const pages = (entry.spectra ?? []).filter((page) => page.isXYdata);
    const own = tables.slice(next, next + pages.length);
    next += pages.length;
    return pages.length > 0 && isOneDimensionalNmr(entry) ? [readBlock(entry, pages, own)] : [];
  });
  if (next !== tables.length) throw new JcampRefused('', 'the blocks of the file do not fit its tables');
  if (blocks.length === 0)
    throw new JcampRefused('DATA TYPE', 'the file holds no one-dimensional NMR SPECTRUM or NMR FID');
  return blocks;
}

/** Decodes the tables and leaves one short line in place of each, so that the package reads structure only. */
function takeTables(text: string): { skeleton: string; tables: DecodedTable[] } {
  const tables: DecodedTable[] = [];
  const skeleton = text
    .split(/^(?=##)/m)
    .map((record) => {
      const [, label, form, body] = /^##([^=]*)=([^\n]*\+\+[^\n]*)\n([^]*)$/.exec(record) ?? [];
      if (label === undefined || !['XYDATA', 'DATATABLE'].includes(canonical(label))) return record;
      tables.push(decode(label, body));
      return `##${label}=${form}\n0 0\n`;
    })
    .join('');
  return { skeleton, tables };
}

function decode(label: string, body: string): DecodedTable {
  try {
    return decodeTable(body);
  } catch (error) {
    if (error instanceof TableError) throw new JcampRefused(label, error.message);
    throw error;
  }
}

/** Labels are compared without case, blanks, hyphens, slashes and underscores. */
function canonical(label: string): string {
  return label.toUpperCase().replace(/[\s\-/_]/g, '');
}

function isOneDimensionalNmr(entry: Entry): boolean {
  return /^NMR\s*(SPECTRUM|FID)/i.test(entry.dataType ?? '') && !entry.twoD;
}

function readBlock(entry: Entry, pages: JcampSpectrum[], tables: DecodedTable[]): JcampData {
  const kind = /FID/i.test(entry.dataType ?? '') ? 'fid' : 'spectrum';
  const [realPage, imagPage] = pages;
  const observeMHz = Number(realPage.observeFrequency ?? NaN);
  if (kind === 'spectrum' && !(observeMHz > 0))
    throw new JcampRefused('.OBSERVE FREQUENCY', 'is missing or no number in MHz');
  checkUnit(kind, String(realPage.xUnits ?? ''));
  const notes: string[] = [];
  const [real, imag] = [realPage, imagPage].map((page, i) => page && ordinates(page, tables[i], notes));
  if (imag && imag.length !== real.length)
    throw new JcampRefused('VAR_DIM', 'real and imaginary pages differ in length');
  let [first, last] = [Number(realPage.firstX), Number(realPage.lastX)];
  if (!Number.isFinite(first) || !Number.isFinite(last) || first === last) {
    throw new JcampRefused('FIRSTX', 'the first and the last abscissa must be two different numbers');
  }
  checkAbscissae(tables[0], Number(realPage.xFactor), (last - first) / (real.length - 1), notes);
  const reference = kind === 'spectrum' ? shiftReference(entry) : null;
  if (reference) {
    const move = reference.ppm - (first + ((reference.point - 1) * (last - first)) / (real.length - 1));
    first += move;
    last += move;
  }
  if (kind === 'spectrum' && first < last) {
    [first, last] = [last, first];
    real.reverse();
    imag?.reverse();
  }
  return {
    kind,
    title: entry.title ?? '',
    isotope: entry.xType ?? '',
    observeMHz,
    first,
    last,
    real,
    ...(imag && { imag }),
    referenced: kind === 'spectrum' && (reference !== null || '$OFFSET' in entry.meta || 'OFFSET' in entry.meta),
    predicted: Object.values(entry.meta).includes('PREDICTION'),
    notes,
  };
}

function checkUnit(kind: JcampData['kind'], unit: string): void {
  const wanted = kind === 'spectrum' ? 'PPM' : 'SECONDS';
  if (!unit.toUpperCase().includes(wanted)) {
    throw new JcampRefused(
      'XUNITS',
      `'${unit}' is no unit of an NMR ${kind}; HZ or PPM is for spectra, SECONDS for FIDs`,
    );
  }
}

/** The decoded ordinates times their factor. */
function ordinates(page: JcampSpectrum, table: DecodedTable, notes: string[]): Float64Array {
  const { nbPoints, yFactor, firstY } = page as { nbPoints?: number; yFactor?: number; firstY?: number };
  if (nbPoints === undefined) throw new JcampRefused('NPOINTS', 'is missing');
  if (table.values.length !== nbPoints) {
    throw new JcampRefused('NPOINTS', `says ${nbPoints} but the table holds ${table.values.length} ordinates`);
  }
  if (nbPoints < 2) throw new JcampRefused('NPOINTS', 'a spectrum has two points at least');
  const factor = yFactor ?? 1;
  const values = table.values.map((value) => value * factor);
  if (!values.every(Number.isFinite)) throw new JcampRefused('YFACTOR', 'the ordinates are not finite');
  if (typeof firstY === 'number' && Math.abs(values[0] - firstY) > Math.abs(factor)) {
    notes.push(`FIRSTY is ${firstY} but the table starts with ${values[0]}`);
  }
  return values;
}

/**
 * Labels, counted from the first one, lie within half a step of their place, or half a unit of their last digit (up to
 * 3.3 steps in sound files that print whole hertz). More is worth a note only: the axis comes from its two ends.
 */
function checkAbscissae({ labels }: DecodedTable, factor: number, step: number, notes: string[]): void {
  const allowed = 0.5 * Math.abs(step) + Math.abs(factor);
  const wrong = labels.findIndex(
    ({ value, index }) => Math.abs((value - labels[0].value) * factor - index * step) > allowed,
  );
  if (wrong >= 0)
    notes.push(`the table labels point ${labels[wrong].index + 1} with ${labels[wrong].value}, which is not its place`);
}

/** `.SHIFT REFERENCE= INTERNAL, TMS, point, ppm`: the point counts from 1 and may be a half. */
function shiftReference(entry: Entry): { point: number; ppm: number } | null {
  const value = entry.info['.SHIFTREFERENCE'];
  const fields = typeof value === 'string' ? value.split(',').slice(-2).map(Number) : [];
  return fields.length === 2 && fields.every(Number.isFinite) ? { point: fields[0], ppm: fields[1] } : null;
}
