import { Matrix } from 'ml-matrix';
import type { Experiment } from '../src/documents/experiment.schema.js';
import type { SpinSystem } from '../src/documents/system.schema.js';
import { offsetsOf, relativePolarisation } from '../src/interactions/carriers.js';
import { nuclide } from '../src/nuclides/nuclides.js';
import type { ComplexArray } from '../src/run/solved.js';

/**
 * The slow and plain way: every operator a Kronecker product of full matrices, the Liouvillian of all exchange states one dense
 * matrix with equilibrium as an inhomogeneous last row, every step its exponential by Taylor's series. Nothing is restricted
 * and nothing shared with the engine but offsets and polarisations. Real and imaginary parts of rho (row-major) are stacked:
 * x = (Re rho, Im rho, 1). For a few nuclei of count 1, "line-width" of zero or "t1-t2", steps pulse, delay and acquire.
 */
export function denseRoute(system: SpinSystem, experiment: Experiment): ComplexArray {
  const spins = system.nuclei.map(({ isotope }) => operatorsOf(nuclide(isotope).spin));
  const embed = (n: number, single: Matrix) =>
    spins.map(({ x }, k) => (k === n ? single : Matrix.eye(x.rows))).reduce((a, b) => a.kroneckerProduct(b));
  const all = spins.map(({ x, y, z }, n) => ({ x: embed(n, x), y: embed(n, y), z: embed(n, z) }));
  const states = system.states ?? [undefined];
  const populations = states.map((state) => state?.population ?? 1);
  const size = all[0].x.rows ** 2;
  const polarisations = system.nuclei.map(({ isotope }) => relativePolarisation(isotope, experiment.observe));
  const equilibrium = sum(all.map(({ z }, n) => Matrix.mul(z, polarisations[n])));
  const stationary = populations.flatMap((population) => equilibrium.to1DArray().map((x) => population * x));

  /** d x/dt with `field` Hz along `phase` radians on the nuclei that `drives` tells. */
  const generator = (field = 0, phase = 0, drives: (n: number) => boolean = () => false): Matrix => {
    const total = states.length * size;
    const real = Matrix.zeros(total, total);
    const imag = Matrix.zeros(total, total);
    states.forEach((state, s) => {
      const offsets = offsetsOf(system, experiment, state);
      const h = sum(all.map(({ z }, n) => Matrix.mul(z, offsets[n])));
      for (const [a, b, j] of couplings(system, state)) {
        h.add(Matrix.mul(all[a].z.mmul(all[b].z), j));
        if (system.nuclei[a].isotope !== system.nuclei[b].isotope) continue;
        // IyIy = -(i Iy)(i Iy)
        h.add(Matrix.mul(all[a].x.mmul(all[b].x).sub(all[a].y.mmul(all[b].y)), j));
      }
      all.forEach(({ x }, n) => drives(n) && h.add(Matrix.mul(x, field * Math.cos(phase))));
      const at = s * size;
      addAt(imag, at, at, commutator(h), -2 * Math.PI);
      all.forEach(
        ({ y }, n) => drives(n) && addAt(real, at, at, commutator(y), -2 * Math.PI * field * Math.sin(phase)),
      );
      if (experiment.relaxation === 't1-t2') addAt(real, at, at, damping(system, experiment, all), -1);
    });
    for (const { from, to, rate } of system.exchange ?? []) {
      const [a, b] = [from, to].map((id) => states.findIndex((state) => state!.id === id));
      const back = (rate! * populations[a]) / populations[b];
      const one = Matrix.eye(size);
      addAt(real, b * size, a * size, one, rate!);
      addAt(real, a * size, a * size, one, -rate!);
      addAt(real, a * size, b * size, one, back);
      addAt(real, b * size, b * size, one, -back);
    }
    const out = Matrix.zeros(2 * total + 1, 2 * total + 1);
    addAt(out, 0, 0, real, 1);
    addAt(out, total, total, real, 1);
    addAt(out, 0, total, imag, -1);
    addAt(out, total, 0, imag, 1);
    if (experiment.relaxation === 't1-t2') {
      const gamma = damping(system, experiment, all);
      states.forEach((_, s) => {
        const source = gamma.mmul(Matrix.columnVector(stationary.slice(s * size, (s + 1) * size)));
        addAt(out, s * size, 2 * total, source, 1);
      });
    }
    return out;
  };

  const free = generator();
  let x = Matrix.columnVector([...stationary, ...stationary.map(() => 0), 1]);
  if (!('steps' in experiment.sequence)) throw new RangeError('The slow route takes steps');
  for (const step of experiment.sequence.steps) {
    if ('delay' in step) x = exponential(Matrix.mul(free, step.delay)).mmul(x);
    else if ('pulse' in step) {
      const { on, flip, phase, seconds } = step.pulse;
      const drives = (n: number) => system.nuclei[n].isotope === on;
      const radians = (phase * Math.PI) / 180;
      // An ideal pulse is a very strong field for a very short time, without all else.
      const rotation = generator(1, radians, drives).sub(free);
      const g =
        seconds === undefined
          ? rotation.mul(flip / 360)
          : generator(flip / 360 / seconds, radians, drives).mul(seconds);
      x = exponential(g).mmul(x);
    }
  }

  const observed = all.filter((_, n) => system.nuclei[n].isotope === experiment.observe);
  const { spin } = nuclide(experiment.observe);
  const norm = 3 / (spin * (spin + 1)) / all[0].x.rows;
  const detect = (v: Matrix): [number, number] => {
    // i (Tr Ix rho + i Tr Iy rho); Tr(A B) = sum A^T_ij B_ij, i Iy = y.
    let [re, im] = [0, 0];
    states.forEach((_, s) => {
      const part = (from: number) => v.to1DArray().slice(from + s * size, from + (s + 1) * size);
      const [real, imag] = [part(0), part(states.length * size)];
      for (const { x: ix, y: iy } of observed) {
        const [tx, ty] = [ix.transpose().to1DArray(), iy.transpose().to1DArray()];
        for (let k = 0; k < size; k++) {
          // Ix + i Iy = x + y
          re -= (tx[k] + ty[k]) * imag[k];
          im += (tx[k] + ty[k]) * real[k];
        }
      }
    });
    return [norm * re, norm * im];
  };
  const { points, width } = experiment.acquisition;
  const fid = { real: new Float64Array(points), imag: new Float64Array(points) };
  const dwell = exponential(Matrix.mul(free, 1 / width));
  for (let k = 0; k < points; k++) {
    [fid.real[k], fid.imag[k]] = detect(x);
    x = dwell.mmul(x);
  }
  return fid;
}

/** Ix, i Iy and Iz, all real. */
function operatorsOf(spin: number): { x: Matrix; y: Matrix; z: Matrix } {
  const n = 2 * spin + 1;
  const up = Matrix.zeros(n, n);
  for (let k = 0; k + 1 < n; k++) {
    const m = spin - k - 1;
    up.set(k, k + 1, Math.sqrt(spin * (spin + 1) - m * (m + 1)));
  }
  const down = up.transpose();
  const z = Matrix.diag(Array.from({ length: n }, (_, k) => spin - k));
  return { x: Matrix.add(up, down).div(2), y: Matrix.sub(up, down).div(2), z };
}

/** rho -> [a, rho] of row-major rho. */
function commutator(a: Matrix): Matrix {
  const one = Matrix.eye(a.rows);
  return a.kroneckerProduct(one).sub(one.kroneckerProduct(a.transpose()));
}

/** Gamma of uncorrelated random fields, by its double commutators. */
function damping(
  { nuclei }: SpinSystem,
  { lineWidth }: Experiment,
  all: readonly { x: Matrix; y: Matrix; z: Matrix }[],
): Matrix {
  const double = (a: Matrix) => commutator(a).mmul(commutator(a));
  return sum(
    all.map(({ x, y, z }, n) => {
      const { t1, t2, lineWidth: own } = nuclei[n];
      const r1 = t1 === undefined ? 0 : 1 / t1;
      const r2 = t2 === undefined ? Math.PI * (own ?? lineWidth) : 1 / t2;
      return double(x)
        .sub(double(y))
        .mul(r1 / 2)
        .add(double(z).mul(r2 - r1 / 2));
    }),
  );
}

function couplings(system: SpinSystem, state: NonNullable<SpinSystem['states']>[number] | undefined) {
  const row = new Map(system.nuclei.map(({ id }, n) => [id, n]));
  return system.couplings.map(({ between: [a, b], j }): [number, number, number] => {
    const own = state?.j?.[`${a},${b}`] ?? state?.j?.[`${b},${a}`] ?? j;
    return [row.get(a)!, row.get(b)!, own];
  });
}

function exponential(a: Matrix): Matrix {
  const norm = Math.max(...a.to2DArray().map((row) => row.reduce((total, x) => total + Math.abs(x), 0)));
  const squarings = Math.max(0, Math.ceil(Math.log2(norm)) + 2);
  const scaled = Matrix.mul(a, 2 ** -squarings);
  let term = Matrix.eye(a.rows);
  let result = Matrix.eye(a.rows);
  for (let k = 1; k <= 14; k++) {
    term = term.mmul(scaled).div(k);
    result.add(term);
  }
  for (let k = 0; k < squarings; k++) result = result.mmul(result);
  return result;
}

function sum(matrices: readonly Matrix[]): Matrix {
  return matrices.slice(1).reduce((total, m) => Matrix.add(total, m), matrices[0].clone());
}

function addAt(out: Matrix, row: number, column: number, part: Matrix, factor: number): void {
  for (let i = 0; i < part.rows; i++) {
    for (let j = 0; j < part.columns; j++) {
      const x = part.get(i, j);
      if (x !== 0) out.set(row + i, column + j, out.get(row + i, column + j) + factor * x);
    }
  }
}
