import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { convert } from 'jcampconverter';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';

const command = fileURLToPath(new URL('../simulate.ts', import.meta.url));

const pair = {
  system: {
    format: 'heddle.spin-system/1',
    name: 'Two protons',
    nuclei: [
      { id: 'Ha', isotope: '1H', shift: 3.1 },
      { id: 'Hb', isotope: '1H', shift: 3.4, count: 2 },
    ],
    couplings: [{ between: ['Ha', 'Hb'], j: 7 }],
  },
  experiment: {
    format: 'heddle.experiment/1',
    protonMHz: 400,
    observe: '1H',
    acquisition: { centre: 3, width: 1200, points: 2048 },
    processing: { zeroFill: 4096 },
  },
};

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'heddle-simulate-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

function put(name: string, document: unknown): string {
  const path = join(folder, name);
  writeFileSync(path, typeof document === 'string' ? document : JSON.stringify(document));
  return path;
}

function simulate(...options: string[]) {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--import', 'tsx', '--conditions=heddle-src', command, ...options],
    { encoding: 'utf8', maxBuffer: 2 ** 28 },
  );
  return { status, stdout, stderr, errors: stderr.split('\n').filter(Boolean) };
}

const pairOptions = (system: unknown = pair.system, experiment: unknown = pair.experiment) => [
  '--system',
  put('s.json', system),
  '--experiment',
  put('e.json', experiment),
];

describe('simulate', () => {
  it('prints the result document with the defaults filled in', () => {
    const { status, stdout, stderr } = simulate(...pairOptions());
    expect(stderr).toBe('');
    expect(status).toBe(0);
    const result = JSON.parse(stdout);
    expect(result.format).toBe('heddle.result/1');
    expect(result.system.nuclei[0].count).toBe(1);
    expect(result.experiment.temperature).toBe(298.15);
    expect(result.spectrum.real).toHaveLength(4096);
    expect(result.fid.imag).toHaveLength(2048);
    // The integral of the absorption over the window is the number of observed nuclei (contract, "FID and spectrum").
    const integral = result.spectrum.real.reduce((sum: number, y: number) => sum + y, 0) * (1200 / 4096);
    expect(integral).toBeCloseTo(3, 6);
  });

  it('writes --out and says nothing', () => {
    const out = join(folder, 'r.json');
    expect(simulate(...pairOptions(), '--out', out)).toMatchObject({ status: 0, stdout: '', stderr: '' });
    expect(JSON.parse(readFileSync(out, 'utf8')).report.engine).toMatch(/^\d+\.\d+\.\d+$/);
  });

  it('writes JCAMP-DX and CSV of the same numbers as JSON', () => {
    const { spectrum } = JSON.parse(simulate(...pairOptions()).stdout);
    const largest = Math.max(...spectrum.real);
    const [block] = convert(simulate(...pairOptions(), '--as', 'jcamp').stdout).flatten;
    const rows = simulate(...pairOptions(), '--as', 'csv')
      .stdout.trim()
      .split('\r\n')
      .slice(1);
    expect(rows).toHaveLength(4096);
    for (const i of [0, 1000, 2047, 4095]) {
      const ppm = spectrum.firstPpm + (i * (spectrum.lastPpm - spectrum.firstPpm)) / 4095;
      expect(block.spectra[0].data.x[i]).toBeCloseTo(ppm, 9);
      expect(Math.abs(block.spectra[0].data.y[i] - spectrum.real[i])).toBeLessThan(1e-7 * largest);
      expect(Math.abs(block.spectra[1].data.y[i] - spectrum.imag[i])).toBeLessThan(1e-7 * largest);
      expect(rows[i].split(',').slice(1).map(Number)).toEqual([spectrum.real[i], spectrum.imag[i]]);
    }
  });

  it('refuses documents with the path of every field, one a line, exit 2', () => {
    const system = {
      ...pair.system,
      nuclei: [pair.system.nuclei[0], { id: 'Hb', isotope: '1H', shift: 'x' }],
      extra: 1,
    };
    const experiment = { ...pair.experiment, observe: '9Zz' };
    const { status, stdout, errors } = simulate(...pairOptions(system, experiment));
    expect(status).toBe(2);
    expect(stdout).toBe('');
    expect(errors.map((line) => line.split(':')[0]).sort()).toEqual(['extra', 'nuclei[1].shift', 'observe']);
  });

  it('refuses two sound documents that do not fit together', () => {
    const { status, errors } = simulate(...pairOptions(pair.system, { ...pair.experiment, observe: '13C' }));
    expect(status).toBe(2);
    expect(errors).toEqual([expect.stringMatching(/^observe: /)]);
  });

  it.each([
    ['text that is no JSON', () => pairOptions('{"format":'), /not JSON/],
    ['an unknown option', () => [...pairOptions(), '--fast'], /--fast/],
    ['a missing option', () => ['--system', put('s.json', pair.system)], /--experiment/],
    ['an unknown form', () => [...pairOptions(), '--as', 'xml'], /json, jcamp, csv/],
    ['a pair beside a batch', () => [...pairOptions(), '--batch', folder], /does not go with --batch/],
    ['a folder without pairs', () => ['--batch', folder], /NAME.system.json/],
  ])('refuses %s with exit 2', (_what, options, message) => {
    const { status, stderr } = simulate(...options());
    expect(stderr).toMatch(message);
    expect(status).toBe(2);
  });

  it('ends with 1 for a file that is not there or can not be written', () => {
    expect(simulate('--system', join(folder, 'none.json'), '--experiment', put('e.json', pair.experiment)).status).toBe(
      1,
    );
    const { status, stderr } = simulate(...pairOptions(), '--out', join(folder, 'none', 'r.json'));
    expect(stderr).toMatch(/none/);
    expect(status).toBe(1);
  });

  it('shows its usage', () => {
    expect(simulate('--help')).toMatchObject({ status: 0, stdout: expect.stringContaining('--batch DIR') });
  });
});

describe('simulate --batch', () => {
  it('writes a result beside each pair and names what it refuses', () => {
    for (const name of ['one', 'two', 'three']) {
      put(`${name}.system.json`, { ...pair.system, name });
      put(`${name}.experiment.json`, pair.experiment);
    }
    put('bad.system.json', { ...pair.system, nuclei: [] });
    put('bad.experiment.json', pair.experiment);
    put('alone.system.json', pair.system);
    const { status, errors } = simulate('--batch', folder);
    expect(status).toBe(2);
    expect(errors).toEqual(
      expect.arrayContaining([expect.stringMatching(/^bad: nuclei: /), expect.stringMatching(/^alone: left out/)]),
    );
    expect(
      readdirSync(folder)
        .filter((file) => file.includes('.result.'))
        .sort(),
    ).toEqual(['one', 'three', 'two'].map((name) => `${name}.result.json`));
    expect(JSON.parse(readFileSync(join(folder, 'two.result.json'), 'utf8')).system.name).toBe('two');
  });
});
