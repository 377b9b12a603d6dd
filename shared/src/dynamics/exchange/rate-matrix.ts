import { BOLTZMANN, GAS_CONSTANT, PLANCK } from '../../constants/constants.js';
import type { ExchangeStep, SpinSystem } from '../../documents/system.schema.js';

/**
 * Rate of a step forward, s^-1: as given, or k_B T/h exp(-(H - T S)/(R T)) with transmission coefficient 1
 * (H. Eyring, J. Chem. Phys. 3 (1935) 107). `temperature` in K.
 */
export function forwardRate({ rate, eyring }: ExchangeStep, temperature: number): number {
  if (!eyring) return rate ?? 0;
  const gibbs = 1000 * eyring.enthalpy - temperature * eyring.entropy;
  return ((BOLTZMANN * temperature) / PLANCK) * Math.exp(-gibbs / (GAS_CONSTANT * temperature));
}

/**
 * Rates between states, s^-1, row-major: entry (to, from) is the rate from one to the other, columns sum to zero. Backward
 * rates follow from detailed balance, k_back = k p_from/p_to, so that the populations are stationary.
 */
export function rateMatrix(system: SpinSystem, temperature: number): Float64Array {
  const states = system.states ?? [];
  const n = Math.max(1, states.length);
  const rates = new Float64Array(n * n);
  const add = (to: number, from: number, rate: number) => {
    rates[to * n + from] += rate;
    rates[from * n + from] -= rate;
  };
  for (const step of system.exchange ?? []) {
    const from = states.findIndex(({ id }) => id === step.from);
    const to = states.findIndex(({ id }) => id === step.to);
    const rate = forwardRate(step, temperature);
    add(to, from, rate);
    add(from, to, (rate * states[from].population) / states[to].population);
  }
  return rates;
}
