import { describe, expect, it } from 'vitest';
import {
  noiseOfOneScan,
  noiseWindow,
  nuclearSensitivity,
  scansFor,
  signalToNoise,
  type ReferenceSensitivity,
} from './sensitivity.js';

const reference: ReferenceSensitivity = {
  isotope: '1H',
  signalToNoise: 400,
  scans: 1,
  concentration: 0.01,
  nuclei: 2,
  lineWidth: 1.8,
  broadening: 1,
};

const sameLine = { height: (2 * 2) / (Math.PI * 1.8), window: 1 / (2 * Math.PI), concentration: 0.01, signalShare: 1 };

describe('sensitivity', () => {
  it('gives back the reference for the reference sample itself', () => {
    expect(signalToNoise(noiseOfOneScan(reference, '1H'), sameLine)).toBeCloseTo(400, 9);
  });

  it('halves with half the concentration and doubles with four times the scans', () => {
    const noise = noiseOfOneScan(reference, '1H');
    expect(signalToNoise(noise, { ...sameLine, concentration: 0.005 })).toBeCloseTo(200, 9);
    expect(noiseOfOneScan({ ...reference, scans: 4 }, '1H')).toBeCloseTo(2 * noise, 12);
    expect(scansFor(100, 10)).toBe(100);
  });

  it('puts 13C a factor of about 31 below 1H for equal numbers of nuclei', () => {
    // (gamma_H / gamma_C)^(5/2) = 3.976^2.5 = 31.5; common practice.
    expect(nuclearSensitivity('1H') / nuclearSensitivity('13C')).toBeCloseTo(31.5, 0);
  });

  it('integrates the exponential window to 1/(2 pi LB) and the open one to the acquisition time', () => {
    expect(noiseWindow(20, 1, 0)).toBeCloseTo(1 / (2 * Math.PI), 3);
    expect(noiseWindow(3, 0, 0)).toBeCloseTo(3, 12);
  });

  it('predicts the rms noise of a transformed white FID', () => {
    // Independent: seeded white noise through the plain definition S = (2/W) sum s_k exp(-2 pi i j k/n).
    const [width, points, noise] = [50, 256, 0.3];
    const gauss = seededGauss(7);
    const re = Float64Array.from({ length: points }, () => gauss() * noise * Math.sqrt(width));
    const im = Float64Array.from({ length: points }, () => gauss() * noise * Math.sqrt(width));
    let square = 0;
    for (let j = 0; j < points; j++) {
      let sum = 0;
      for (let k = 0; k < points; k++) {
        const angle = (2 * Math.PI * j * k) / points;
        sum += re[k] * Math.cos(angle) + im[k] * Math.sin(angle);
      }
      square += ((2 / width) * sum) ** 2;
    }
    const rms = Math.sqrt(square / points);
    const expected = 2 * noise * Math.sqrt(noiseWindow(points / width, 0, 0));
    expect(Math.abs(rms / expected - 1)).toBeLessThan(0.15);
  });
});

/** Box-Muller over a small linear congruential generator, so that the test repeats. */
function seededGauss(seed: number): () => number {
  let state = seed;
  const uniform = () => {
    state = (state * 1664525 + 1013904223) % 2 ** 32;
    return (state + 0.5) / 2 ** 32;
  };
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}
