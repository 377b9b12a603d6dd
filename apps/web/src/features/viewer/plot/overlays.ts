import type { Line } from '@heddle/shared';
import type uPlot from 'uplot';
import type { Dye, Surfaces } from '../../../theme/dyes';
import type { Range } from '../logic/axis';
import { spreadLabels, type DrawnIntegral } from '../logic/drawing';

/** Where a layer above the traces is drawn. */
export interface Overlay {
  readonly u: uPlot;
  readonly dyes: Surfaces & Record<Dye, string>;
  readonly range: Range;
}

/** Lines beyond this number in view are not marked: they would only be a band. */
const MOST_MARKS = 400;
const MOST_LABELS = 60;

const ratio = () => globalThis.devicePixelRatio || 1;

/** A tick for each line at the foot of the plot, longer for stronger ones. */
export function drawLineMarks({ u, dyes, range }: Overlay, lines: readonly Line[]): void {
  const seen = lines.filter(({ ppm }) => ppm <= range.high && ppm >= range.low);
  if (seen.length === 0 || seen.length > MOST_MARKS) return;
  const strongest = Math.max(...seen.map(({ intensity }) => Math.abs(intensity)));
  const { ctx, bbox } = u;
  ctx.save();
  ctx.strokeStyle = dyes.woad;
  ctx.lineWidth = ratio();
  ctx.beginPath();
  for (const { ppm, intensity } of seen) {
    const x = Math.round(u.valToPos(ppm, 'x', true)) + 0.5;
    const foot = bbox.top + bbox.height - 1;
    ctx.moveTo(x, foot);
    ctx.lineTo(x, foot - (2 + 8 * Math.sqrt(Math.abs(intensity) / strongest)) * ratio());
  }
  ctx.stroke();
  ctx.restore();
}

/** Peak positions, upright at the top, each joined to its place. */
export function drawPeaks({ u, dyes, range }: Overlay, peaks: readonly { ppm: number; height: number }[]): void {
  const seen = peaks
    .filter(({ ppm }) => ppm <= range.high && ppm >= range.low)
    .sort((a, b) => b.height - a.height)
    .slice(0, MOST_LABELS)
    .sort((a, b) => b.ppm - a.ppm);
  if (seen.length === 0) return;
  const { ctx, bbox } = u;
  const px = ratio();
  const places = seen.map(({ ppm }) => u.valToPos(ppm, 'x', true));
  const labels = spreadLabels(places, 13 * px, bbox.left, bbox.left + bbox.width);
  ctx.save();
  ctx.strokeStyle = dyes.edge;
  ctx.fillStyle = dyes.ink;
  ctx.lineWidth = px;
  ctx.font = `${11 * px}px 'Plex Sans', sans-serif`;
  ctx.textBaseline = 'middle';
  ctx.textAlign = 'right';
  seen.forEach(({ ppm }, i) => {
    ctx.beginPath();
    ctx.moveTo(labels[i], bbox.top + 42 * px);
    ctx.lineTo(places[i], bbox.top + 52 * px);
    ctx.stroke();
    ctx.save();
    ctx.translate(labels[i], bbox.top);
    ctx.rotate(-Math.PI / 2);
    ctx.fillText(ppm.toFixed(3), 0, 0);
    ctx.restore();
  });
  ctx.restore();
}

/** Each region's running integral as a dashed curve with its number. */
export function drawIntegrals({ u, dyes, range }: Overlay, integrals: readonly DrawnIntegral[]): void {
  const { ctx, bbox } = u;
  const px = ratio();
  ctx.save();
  ctx.beginPath();
  ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height);
  ctx.clip();
  ctx.strokeStyle = dyes.madder;
  ctx.fillStyle = dyes.madder;
  ctx.lineWidth = 1.25 * px;
  ctx.font = `${12 * px}px 'Plex Sans', sans-serif`;
  ctx.textAlign = 'center';
  for (const { range: region, curve, label } of integrals) {
    if (region.low > range.high || region.high < range.low) continue;
    const total = curve.reduce((most, value) => Math.max(most, Math.abs(value)), 0) || 1;
    ctx.setLineDash([5 * px, 3 * px]);
    ctx.beginPath();
    curve.forEach((value, k) => {
      const ppm = region.high - (k / (curve.length - 1)) * (region.high - region.low);
      ctx.lineTo(u.valToPos(ppm, 'x', true), bbox.top + bbox.height * (0.8 - 0.55 * (value / total)));
    });
    ctx.stroke();
    ctx.setLineDash([]);
    ctx.fillText(label, u.valToPos((region.high + region.low) / 2, 'x', true), bbox.top + bbox.height * 0.9);
  }
  ctx.restore();
}
