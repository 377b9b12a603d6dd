import FFT from 'fft.js';
import { coneHarmonics, type RotorCone } from './rotor.js';
import { type Surface } from './surfaces.js';

/**
 * Spinning sidebands of one transition averaged over the rotor phase. With f(theta) the frequency round the cone and
 * Phi(theta) the integral of (f - mean)/rate, the line at mean + N rate has the intensity |F_N|^2, F_N the Fourier components
 * of exp(i Phi) (M. M. Maricq & J. S. Waugh, J. Chem. Phys. 70, 3300 (1979); J. Herzfeld & A. E. Berger, ibid. 73, 6021 (1980)).
 */
export class SidebandSeries {
  /** |F_N|^2 of the last `evaluate`: N at index N for N >= 0, at size + N below. */
  readonly intensity: Float64Array;
  /** Mean frequency of the last `evaluate`, Hz. */
  mean = 0;
  readonly size: number;
  private readonly transform: FFT;
  private readonly input: Float64Array;
  private readonly output: Float64Array;
  private readonly cosines: Float64Array;
  private readonly harmonics = new Float64Array(5);
  private readonly quartic = new Float64Array(5);
  private readonly series = new Float64Array(9);

  /** `orders` is the highest sideband order that can have intensity. */
  constructor(
    private readonly rate: number,
    orders: number,
  ) {
    this.size = 16;
    while (this.size < 2 * orders + 2) this.size *= 2;
    this.transform = new FFT(this.size);
    this.input = new Float64Array(2 * this.size);
    this.output = new Float64Array(2 * this.size);
    this.intensity = new Float64Array(this.size);
    this.cosines = Float64Array.from({ length: this.size }, (_, k) => Math.cos((2 * Math.PI * k) / this.size));
  }

  evaluate(surface: Surface, cone: RotorCone): void {
    const { series, size, rate, input, output, intensity } = this;
    coneHarmonics(surface.form, cone, this.harmonics);
    series.fill(0);
    series.set(this.harmonics);
    const top = surface.kappa === 0 ? 2 : 4;
    if (surface.kappa !== 0) {
      coneHarmonics(surface.quadrupole!, cone, this.quartic);
      addSquare(series, this.quartic, surface.kappa);
    }
    this.mean = series[0];
    for (let k = 0; k < size; k++) {
      let phase = 0;
      for (let m = 1; m <= top; m++)
        phase += (series[2 * m - 1] * this.sin(m * k) - series[2 * m] * this.cos(m * k)) / m;
      phase /= rate;
      input[2 * k] = Math.cos(phase);
      input[2 * k + 1] = Math.sin(phase);
    }
    this.transform.transform(output, input);
    for (let k = 0; k < size; k++) intensity[k] = (output[2 * k] ** 2 + output[2 * k + 1] ** 2) / (size * size);
  }

  private cos(k: number): number {
    return this.cosines[k & (this.size - 1)];
  }

  private sin(k: number): number {
    return this.cosines[(k + 3 * (this.size / 4)) & (this.size - 1)];
  }
}

/** Adds factor (q0 + q1 cos + q2 sin + q3 cos 2 + q4 sin 2)^2 to a series of up to four harmonics, [mean, cos, sin, ...]. */
function addSquare(series: Float64Array, q: Float64Array, factor: number): void {
  series[0] += factor * (q[0] * q[0] + (q[1] * q[1] + q[2] * q[2] + q[3] * q[3] + q[4] * q[4]) / 2);
  series[1] += factor * (2 * q[0] * q[1] + q[1] * q[3] + q[2] * q[4]);
  series[2] += factor * (2 * q[0] * q[2] + q[1] * q[4] - q[2] * q[3]);
  series[3] += factor * (2 * q[0] * q[3] + (q[1] * q[1] - q[2] * q[2]) / 2);
  series[4] += factor * (2 * q[0] * q[4] + q[1] * q[2]);
  series[5] += factor * (q[1] * q[3] - q[2] * q[4]);
  series[6] += factor * (q[1] * q[4] + q[2] * q[3]);
  series[7] += (factor * (q[3] * q[3] - q[4] * q[4])) / 2;
  series[8] += factor * q[3] * q[4];
}

/**
 * The highest order with intensity, for frequencies within `spread` Hz of their mean: a phase modulation of index x has none
 * beyond x by a few cube roots of x (M. Abramowitz & I. A. Stegun, Handbook of Mathematical Functions, 9.3; allowance found by trial).
 */
export function highestOrder(spread: number, rate: number): number {
  const index = spread / rate;
  return Math.ceil(index + 6 * Math.cbrt(index) + 8);
}
