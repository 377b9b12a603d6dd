import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { convert } from 'jcampconverter';
import { describe, expect, it } from 'vitest';
import { readJcamp } from './jcamp-reader.js';

const samples = fileURLToPath(new URL('../../test/reference/jcamp', import.meta.url));
const sample = (name: string) => readFileSync(join(samples, name), 'latin1');
const expected = JSON.parse(sample('expected.json'));

/** Instrument exports of the development package jcamp-data-test 0.2.1 (data set doi 10.7910/DVN/ZAZDNM). */
const measuredFolder = join(dirname(createRequire(import.meta.url).resolve('jcamp-data-test')), '../data');
const measured = (name: string) => readFileSync(join(measuredFolder, name), 'latin1');

describe('readJcamp on the sample set', () => {
  it.each(['affn-xydata.jdx', 'difdup-xydata.jdx'])('reads %s to the listed numbers', (name) => {
    const [block] = readJcamp(sample(name));
    expect([...block.real]).toEqual(expected.files[name].y);
    expect(block).toMatchObject({
      kind: 'spectrum',
      isotope: '1H',
      observeMHz: 400,
      referenced: true,
      predicted: false,
      notes: [],
    });
    expect([block.first, block.last]).toEqual([expected.x_ppm[0], expected.x_ppm[15]]);
    expect(block.imag).toBeUndefined();
  });

  it('reads both pages of ntuples-complex.jdx', () => {
    const [block] = readJcamp(sample('ntuples-complex.jdx'));
    const [real, imag] = expected.files['ntuples-complex.jdx'].pages;
    expect([...block.real]).toEqual(real.y);
    expect([...block.imag!]).toEqual(imag.y);
  });
});

describe('readJcamp on measured files', () => {
  // Points, frequency and the two ends of the axis as a general-purpose reader gave them when the set was catalogued.
  it.each([
    ['aspirin-1h.dx', 'spectrum', 300.132251, 32768, 15.4787, -0.4781],
    ['aspirin-1h.fid.dx', 'fid', 300.132251, 8192, 0, 1.7102808],
    ['Rutin_3080ug200uL_DMSOd6_13CNMR_400MHz_JDX.jdx', 'spectrum', 100.525303, 52430, 225.6028, -25.6028],
    ['qmagnetics/ibuprofen_j_ave_qmagnetics.jdx', 'fid', 123.8826, 40000, 0, 3.9999],
  ])('reads %s', (name, kind, mhz, points, first, last) => {
    const [block] = readJcamp(measured(name));
    expect(block.kind).toBe(kind);
    expect(block.real).toHaveLength(points);
    expect(block.observeMHz).toBeCloseTo(mhz, 5);
    expect(block.first).toBeCloseTo(first, 4);
    expect(block.last).toBeCloseTo(last, 4);
    expect(block.notes).toEqual([]);
  });

  it('decodes the tables as jcampconverter does', () => {
    const text = measured('aspirin-1h.dx');
    const [block] = readJcamp(text);
    const [real, imag] = convert(text).flatten[0].spectra;
    expect([...block.real]).toEqual(real.data.y);
    expect([...block.imag!]).toEqual(imag.data.y);
  });

  it('refuses a two-dimensional file with a reason', () => {
    expect(() => readJcamp(measured('Rutin_3080ug200uL_DMSOd6_COSY_400MHz_JDX.jdx'))).toThrow('no one-dimensional NMR');
  });
});

describe('readJcamp at the gate', () => {
  const good = sample('affn-xydata.jdx');
  const without = (label: string) => good.replace(new RegExp(`^##${label}=.*\r?\n`, 'm'), '');

  it.each([
    ['no NPOINTS', without('NPOINTS'), 'NPOINTS'],
    ['a wrong NPOINTS', good.replace('NPOINTS= 16', 'NPOINTS= 15'), 'NPOINTS'],
    ['no frequency', without('.OBSERVE FREQUENCY'), '.OBSERVE FREQUENCY'],
    ['an axis of another kind', good.replace('XUNITS= HZ', 'XUNITS= 1/CM'), 'XUNITS'],
    ['an axis without length', good.replace('LASTX= 2100', 'LASTX= 2400'), 'FIRSTX'],
    ['a missing ordinate', good.replace('2280 118', '2280 ?'), 'XYDATA'],
    ['another technique', good.replace('NMR SPECTRUM', 'INFRARED SPECTRUM'), 'DATA TYPE'],
    ['no JCAMP-DX at all', 'ppm,real\r\n1,2\r\n', 'DATA TYPE'],
  ])('refuses %s and names the record', (_what, text, record) => {
    expect(() => readJcamp(text)).toThrow(expect.objectContaining({ name: 'JcampRefused', record }));
  });

  it.each([
    ['blanks before the labels', good.replace(/^##/gm, '  ##')],
    ['lone carriage returns', good.replace(/\r?\n/g, '\r')],
    ['a comment after the frequency', good.replace('FREQUENCY= 400.0', () => 'FREQUENCY= 400.0 $$ MHz')],
    ['labels in another spelling', good.replace('##DATA TYPE', '##Data_Type').replace('##NPOINTS', '##n points')],
  ])('reads a file with %s', (_what, text) => {
    const [block] = readJcamp(text);
    expect([...block.real]).toEqual(expected.files['affn-xydata.jdx'].y);
    expect([block.first, block.last]).toEqual([6, 5.25]);
  });

  it('moves the axis to the shift reference and turns an ascending spectrum round', () => {
    const moved = readJcamp(good.replace('TMS, 1, 6.0', 'TMS, 2.5, 7'))[0];
    expect(moved.first).toBeCloseTo(7 + 1.5 * 0.05, 12); // point 1 lies 1.5 steps of 0.05 ppm above point 2.5
    const ascending = readJcamp(
      without('.SHIFT REFERENCE').replace('FIRSTX= 2400', 'FIRSTX= 2100').replace('LASTX= 2100', 'LASTX= 2400'),
    )[0];
    expect([ascending.first, ascending.last]).toEqual([6, 5.25]);
    expect([...ascending.real]).toEqual([...expected.files['affn-xydata.jdx'].y].reverse());
    expect(ascending.referenced).toBe(false);
  });

  it('keeps what is odd but harmless as a note', () => {
    expect(readJcamp(good.replace('FIRSTY= 0', 'FIRSTY= 7'))[0].notes[0]).toContain('FIRSTY is 7');
    expect(readJcamp(good.replace(/^2280 /m, '9999 '))[0].notes[0]).toContain('9999');
  });
});
