import { BAND_ROWS, octahedralGrid, rowLength } from '../../orientations/octahedral-grid.js';
import type { Domain } from '../../orientations/symmetry.js';
import type { Job } from './job.js';
import type { DirectionalSpectrum } from './directional-spectrum.js';
import { PatchIntegrator } from './patches.js';

/** The mean of a spectrum over the sphere: one unit for each band of each face of an octahedral grid. */
export function patchJob(
  spectrum: DirectionalSpectrum,
  domain: Domain,
  orientations: number,
  toleranceHz: number,
): Job {
  const grid = octahedralGrid(orientations, domain);
  let integrator: PatchIntegrator | undefined;
  return {
    orientations: grid.orientations,
    transitions: spectrum.transitions,
    units: grid.faces.length * grid.bands,
    costOf: (unit) => BAND_ROWS * rowLength(grid, BAND_ROWS * (unit % grid.bands)),
    run(unit, sum) {
      integrator ??= new PatchIntegrator(grid, spectrum, toleranceHz);
      integrator.addBand(Math.floor(unit / grid.bands), unit % grid.bands, sum.fine, sum.coarse);
    },
  };
}
