import { larmorMHz, type Approximation, type Experiment, type Line, type Result } from '@heddle/shared';

/** Rows of the acquisition table: what to set, and to what. */
export function acquisitionRows({ experiment }: Result): [string, string][] {
  const { acquisition, observe, protonMHz, sample, decouple } = experiment;
  const mhz = larmorMHz(observe, protonMHz);
  return [
    ['Observed nuclide', `${observe} at ${mhz.toFixed(3)} MHz (1H ${+protonMHz.toFixed(3)} MHz)`],
    ['Sequence', sequenceWords(experiment)],
    ['Decoupled', decouple.length > 0 ? decouple.join(', ') : 'nothing'],
    ['Sample', sampleWords(sample)],
    ['Temperature', `${experiment.temperature} K`],
    ['Centre', `${acquisition.centre} ppm`],
    ['Spectral width', `${acquisition.width} Hz (${(acquisition.width / mhz).toFixed(2)} ppm)`],
    ['Points', `${acquisition.points}, ${(acquisition.points / acquisition.width).toPrecision(4)} s of acquisition`],
  ];
}

function sequenceWords({ sequence }: Experiment): string {
  if (!('recipe' in sequence)) return `${sequence.steps.length} steps of its own`;
  const { recipe, ...values } = sequence;
  const settings = Object.entries(values).map(([name, value]) => `${name} ${String(value)}`);
  return [recipe.replaceAll('-', ' '), ...settings].join(', ');
}

function sampleWords(sample: Experiment['sample']): string {
  if (sample.kind === 'spinning') return `powder, spinning at ${sample.rateHz} Hz`;
  return sample.kind === 'crystal' ? 'single crystal' : sample.kind;
}

/** Groups of lines that stand apart from others by more than `gapHz`: where to look, and what is there. */
export function lookFor(lines: readonly Line[], gapHz = 25): string[] {
  const groups: Line[][] = [];
  for (const line of [...lines].sort((a, b) => b.hz - a.hz)) {
    const group = groups.at(-1);
    if (group && group[group.length - 1].hz - line.hz < gapHz) group.push(line);
    else groups.push([line]);
  }
  return groups
    .map((group) => {
      const intensity = group.reduce((sum, line) => sum + line.intensity, 0);
      const centre = group.reduce((sum, line) => sum + line.intensity * line.ppm, 0) / intensity;
      const strong = group.filter((line) => Math.abs(line.intensity) > 0.02 * Math.abs(intensity));
      const nuclei = [...new Set(strong.flatMap((line) => line.nuclei))].sort();
      const width = group[0].hz - group[group.length - 1].hz;
      return {
        intensity,
        text: `${centre.toFixed(3)} ppm: ${nuclei.join(', ')}, ${intensity.toFixed(2)} nuclei, ${strong.length} lines over ${width.toFixed(1)} Hz`,
      };
    })
    .filter(({ intensity }) => Math.abs(intensity) > 0.02)
    .map(({ text }) => text);
}

/** One line for each approximation of any size, doubtful ones marked. */
export function leftOutRows(approximations: readonly Approximation[]): { text: string; doubtful: boolean }[] {
  return approximations
    .filter(({ hz }) => hz > 0)
    .sort((a, b) => b.hz - a.hz)
    .map(({ title, hz, made, warnAbove }) => {
      const doubtful = made && hz > warnAbove;
      return { doubtful, text: `${title}: ${+hz.toPrecision(3)} Hz${doubtful ? ' (mind this)' : ''}` };
    });
}

/** The usual cautions of work at a spectrometer; the rules of the laboratory stand above all of them. */
export const CAUTIONS = [
  'Magnetic field: keep pacemakers and other implants, steel tools, cards and watches outside the marked line.',
  'Cryogens: a quench displaces oxygen. Leave at once when the alarm sounds; fill only with training and eye protection.',
  'Radio-frequency power: keep pulse lengths, duty cycle and decoupling within the limits of the probe.',
  'Pressurised and spinning tubes can burst: use rated tubes, check them for cracks, keep guards in place.',
  'Temperature: stay between melting and boiling point of the solvent, and within the range of tube and probe.',
  'Follow the rules of your laboratory; the licensed operator decides.',
];
