import type { Spectrum } from '@heddle/shared';

/** A spectrum for each row of a map, all brought onto one ppm axis. */
export interface SeriesMap {
  readonly columns: number;
  readonly rows: number;
  /** 0..1 by row; 1 is the highest point of all. */
  readonly values: Float64Array;
}

/** The largest absorption under each of `columns` columns between `high` and `low` ppm, row by row. */
export function seriesMap(spectra: readonly Spectrum[], high: number, low: number, columns: number): SeriesMap {
  const values = new Float64Array(spectra.length * columns);
  let most = 0;
  spectra.forEach(({ firstPpm, lastPpm, real }, row) => {
    const perPpm = (real.length - 1) / (firstPpm - lastPpm);
    for (let column = 0; column < columns; column++) {
      const from = (firstPpm - (high - ((high - low) * column) / columns)) * perPpm;
      const to = (firstPpm - (high - ((high - low) * (column + 1)) / columns)) * perPpm;
      let value = 0;
      for (let i = Math.max(0, Math.floor(from)); i <= Math.min(real.length - 1, Math.ceil(to)); i++) {
        if (real[i] > value) value = real[i];
      }
      values[row * columns + column] = value;
      if (value > most) most = value;
    }
  });
  if (most > 0) for (let i = 0; i < values.length; i++) values[i] /= most;
  return { columns, rows: spectra.length, values };
}
