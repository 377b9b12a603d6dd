import { traceStyle } from '../../theme/dyes';
import type { useDyes } from '../../theme/useDyes';
import { notifyDone, notifyFailure } from '../../lib/forms';
import type { Range } from './logic/axis';
import { drawSvg, type DrawnIntegral } from './logic/drawing';
import type { PlotTrace } from './plot/SpectrumPlot';

/** What of the screen goes into a copy. */
export interface ScreenPicture {
  readonly title: string;
  readonly range: Range;
  readonly least: number;
  readonly most: number;
  readonly traces: readonly PlotTrace[];
  readonly peaks: readonly { ppm: number; height: number }[];
  readonly integrals: readonly DrawnIntegral[];
  readonly dyes: ReturnType<typeof useDyes>;
}

const SIZE = { width: 1200, height: 560 };

function svgOf({ dyes, traces, ...picture }: ScreenPicture): string {
  return drawSvg(
    {
      ...picture,
      unit: 'ppm',
      lines: [],
      traces: traces.map(({ label, samples }, i) => {
        const { dye, dash } = traceStyle(i);
        return { label, samples, colour: dyes[dye], dash };
      }),
      colours: { paper: dyes.fleece, ink: dyes.ink, soft: dyes.inkSoft, rule: dyes.rule, integral: dyes.madder },
    },
    SIZE.width,
    SIZE.height,
  );
}

export async function copySvg(picture: ScreenPicture): Promise<void> {
  try {
    await navigator.clipboard.writeText(svgOf(picture));
    notifyDone('The picture is in the clipboard as SVG.');
  } catch (error) {
    notifyFailure('Not copied', error);
  }
}

export function saveSvg(picture: ScreenPicture, name: string): void {
  save(new Blob([svgOf(picture)], { type: 'image/svg+xml' }), `${name}.svg`);
}

/** Drawn at twice the size, for print. */
export async function savePng(picture: ScreenPicture, name: string): Promise<void> {
  try {
    const image = new Image();
    image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgOf(picture))}`;
    await image.decode();
    const canvas = document.createElement('canvas');
    canvas.width = 2 * SIZE.width;
    canvas.height = 2 * SIZE.height;
    canvas.getContext('2d')!.drawImage(image, 0, 0, canvas.width, canvas.height);
    const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'));
    if (blob) save(blob, `${name}.png`);
  } catch (error) {
    notifyFailure('Not saved', error);
  }
}

function save(blob: Blob, name: string): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(blob);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 1000);
}
