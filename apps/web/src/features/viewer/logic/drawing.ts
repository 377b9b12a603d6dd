import type { Line } from '@heddle/shared';
import type { Range } from './axis';
import { columnTrace, type Samples } from './columns';

export interface DrawnTrace {
  readonly label: string;
  readonly samples: Samples;
  readonly colour: string;
  readonly dash: readonly number[];
}

export interface DrawnIntegral {
  readonly range: Range;
  readonly curve: Float64Array;
  readonly label: string;
}

/** Everything that a picture of a spectrum shows. */
export interface Picture {
  readonly title: string;
  readonly range: Range;
  readonly least: number;
  readonly most: number;
  readonly traces: readonly DrawnTrace[];
  readonly peaks: readonly { readonly ppm: number; readonly height: number }[];
  readonly integrals: readonly DrawnIntegral[];
  readonly lines: readonly Line[];
  readonly unit: string;
  readonly colours: {
    readonly paper: string;
    readonly ink: string;
    readonly soft: string;
    readonly rule: string;
    readonly integral: string;
  };
}

/** Round values inside a range, about `wanted` of them, highest first. */
export function ticks({ high, low }: Range, wanted: number): { values: number[]; decimals: number } {
  const raw = (high - low) / wanted;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step =
    [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= raw * 0.999) ?? 10 * power;
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const values: number[] = [];
  for (let index = Math.floor(high / step + 1e-9); index * step >= low - 1e-9 * step; index--)
    values.push(+(index * step).toFixed(decimals + 1));
  return { values, decimals };
}

/** Stick peak labels apart: the x of each label, no two closer than `gap`, as near to its peak as order allows. */
export function spreadLabels(places: readonly number[], gap: number, from: number, to: number): number[] {
  const out = [...places];
  for (let i = 1; i < out.length; i++) out[i] = Math.max(out[i], out[i - 1] + gap);
  if (out.length > 0 && out[out.length - 1] > to) {
    out[out.length - 1] = Math.max(places[places.length - 1] > to ? to : Math.min(out[out.length - 1], to), from);
    for (let i = out.length - 2; i >= 0; i--) out[i] = Math.min(out[i], out[i + 1] - gap);
  }
  return out;
}

const escape = (text: string) => text.replace(/[&<>"]/g, (char) => `&#${char.charCodeAt(0)};`);
const round = (value: number) => (Math.abs(value) < 1e5 ? +value.toFixed(2) : Math.sign(value) * 1e5);

/** The picture as an SVG document of `width` x `height` px, with text as text. */
export function drawSvg(picture: Picture, width: number, height: number): string {
  const { range, colours } = picture;
  const [left, right, top, bottom] = [16, 16, 66, 42];
  const plot = { width: width - left - right, height: height - top - bottom };
  const x = (ppm: number) => left + ((range.high - ppm) / (range.high - range.low)) * plot.width;
  const y = (value: number) => top + (1 - (value - picture.least) / (picture.most - picture.least)) * plot.height;
  const columns = Math.round(plot.width);
  const parts: string[] = [];
  const text = (at: [number, number], content: string, more = '') =>
    `<text x="${round(at[0])}" y="${round(at[1])}" ${more}>${escape(content)}</text>`;

  const base = top + plot.height + 6;
  parts.push(`<path d="M${left} ${base}H${left + plot.width}" stroke="${colours.ink}" fill="none"/>`);
  const { values, decimals } = ticks(range, Math.max(2, plot.width / 90));
  for (const value of values) {
    parts.push(`<path d="M${round(x(value))} ${base}v5" stroke="${colours.ink}" fill="none"/>`);
    parts.push(text([x(value), base + 18], value.toFixed(decimals), 'text-anchor="middle"'));
  }
  parts.push(text([left + plot.width, base + 32], picture.unit, `text-anchor="end" fill="${colours.soft}"`));
  parts.push(text([left, 18], picture.title, 'font-weight="600"'));
  parts.push(`<g clip-path="url(#plot)" fill="none" stroke-linejoin="round">`);
  for (const { samples, colour, dash } of picture.traces) {
    const values = columnTrace(samples, range.high, range.low, columns);
    const points: string[] = [];
    values.forEach((value, k) => {
      if (!Number.isNaN(value))
        points.push(
          `${round(left + (Math.floor(k / 2) + (k % 2 === 0 ? 0.25 : 0.75)) * (plot.width / columns))},${round(y(value))}`,
        );
    });
    parts.push(
      `<polyline points="${points.join(' ')}" stroke="${colour}"${dash.length > 0 ? ` stroke-dasharray="${dash.join(' ')}"` : ''}/>`,
    );
  }
  for (const { range: region, curve } of picture.integrals)
    parts.push(integralPath(region, curve, x, top, plot.height, colours.integral));
  parts.push('</g>');
  for (const { range: region, label } of picture.integrals) {
    parts.push(
      text([x((region.high + region.low) / 2), base - 8], label, `text-anchor="middle" fill="${colours.integral}"`),
    );
  }
  const seen = picture.peaks.filter(({ ppm }) => ppm <= range.high && ppm >= range.low).sort((a, b) => b.ppm - a.ppm);
  const labels = spreadLabels(
    seen.map(({ ppm }) => x(ppm)),
    12,
    left,
    left + plot.width,
  );
  seen.forEach(({ ppm }, i) => {
    const place = labels[i];
    parts.push(
      `<path d="M${round(x(ppm))} ${top - 2}L${round(place)} ${top - 8}" stroke="${colours.soft}" fill="none"/>`,
    );
    parts.push(
      text(
        [place, top - 10],
        ppm.toFixed(3),
        `transform="rotate(-90 ${round(place)} ${top - 10})" font-size="9" dominant-baseline="central"`,
      ),
    );
  });
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" font-family="sans-serif" font-size="12" fill="${colours.ink}">`,
    `<title>${escape(picture.title)}</title>`,
    `<defs><clipPath id="plot"><rect x="${left}" y="${top}" width="${plot.width}" height="${plot.height + 6}"/></clipPath></defs>`,
    `<rect width="${width}" height="${height}" fill="${colours.paper}"/>`,
    ...parts,
    '</svg>',
  ].join('\n');
}

function integralPath(
  region: Range,
  curve: Float64Array,
  x: (ppm: number) => number,
  top: number,
  height: number,
  colour: string,
): string {
  const total = Math.max(...curve.map(Math.abs)) || 1;
  const points = Array.from(curve, (value, k) => {
    const ppm = region.high - (k / (curve.length - 1)) * (region.high - region.low);
    return `${round(x(ppm))},${round(top + height * (0.75 - 0.6 * (value / total)))}`;
  });
  return `<polyline points="${points.join(' ')}" stroke="${colour}" stroke-dasharray="4 2"/>`;
}
