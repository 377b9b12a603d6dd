import { describe, expect, it } from 'vitest';
import { elementsOf, isotopesOf, looksLikeXyz, readGeometry } from './read';
import { project } from './view';

const WATER = '3\nwater\nO 0 0 0\nH 0.96 0 0\nH -0.24 0.93 0\n';

describe('readGeometry', () => {
  it('reads XYZ and counts elements', () => {
    const read = readGeometry(WATER);
    if (!('geometry' in read)) throw new Error(read.refusal);
    expect(elementsOf(read.geometry)).toEqual([
      { element: 'H', count: 2 },
      { element: 'O', count: 1 },
    ]);
  });

  it('says which line is wrong', () => {
    expect(readGeometry('2\n\nH 0 0 0\nH 0 zero 0\n')).toEqual({ refusal: expect.stringMatching(/^line 4/) });
  });

  it('tells a molfile from XYZ by its first lines', () => {
    expect(looksLikeXyz(WATER)).toBe(true);
    expect(looksLikeXyz('title\n\n\n  1  0  0  0  0  0  0  0  0  0999 V2000\n')).toBe(false);
  });
});

it('offers the isotopes of an element, spin 1/2 first', () => expect(isotopesOf('H')[0]).toBe('1H'));

describe('project', () => {
  const positions = [
    [1, 0, 0],
    [-1, 0, 0],
  ];
  it('keeps distances between points that a turn about the line of sight leaves alone', () => {
    const [a, b] = project(positions, 0, 0.7, 100);
    expect(a.x - b.x).toBeCloseTo(84);
    expect(a.y).toBeCloseTo(b.y);
  });
  it('brings a point to the front in a quarter turn', () => {
    const [a, b] = project(positions, Math.PI / 2, 0, 100);
    expect(a.x).toBeCloseTo(b.x);
    expect(Math.abs(a.depth - b.depth)).toBeCloseTo(2);
  });
});
