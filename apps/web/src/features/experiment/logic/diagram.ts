import type { Step } from '@heddle/shared';

export type Mark =
  | { kind: 'bar'; x: number; y: number; width: number; height: number; label: string; soft: boolean }
  | { kind: 'signal'; path: string }
  | { kind: 'word'; x: number; y: number; label: string };

export interface SequenceLayout {
  readonly channels: readonly { isotope: string; y: number }[];
  readonly marks: readonly Mark[];
  readonly width: number;
  readonly height: number;
  /** The sequence in words, for a screen reader. */
  readonly words: string;
}

const LEFT = 40;
const CHANNEL = 46;
const TALLEST = 22;
/** Steps drawn; a longer train is cut with a note. */
const MOST = 24;

/** Places the steps of a sequence. A 180 degree pulse is as tall as a 90 degree one and twice as wide. */
export function layoutSequence(steps: readonly Step[], observe: string): SequenceLayout {
  const isotopes = [observe];
  for (const step of steps) if ('pulse' in step && !isotopes.includes(step.pulse.on)) isotopes.push(step.pulse.on);
  const channels = isotopes.map((isotope, i) => ({ isotope, y: 38 + i * CHANNEL }));
  const yOf = (isotope: string) => channels[Math.max(0, isotopes.indexOf(isotope))].y;
  const bottom = channels[channels.length - 1].y;
  const marks: Mark[] = [];
  let x = LEFT;
  const shown = steps.length > MOST ? [...steps.slice(0, MOST - 2), ...steps.slice(-1)] : steps;
  shown.forEach((step, i) => {
    const cut = steps.length > MOST && i === MOST - 2;
    if (cut) {
      marks.push({ kind: 'word', x: x + 16, y: bottom - 8, label: '\u2026' });
      x += 32;
    }
    x = place(step, x, marks, yOf, bottom, observe);
  });
  return { channels, marks, width: x + 8, height: bottom + 22, words: steps.slice(0, MOST).map(wordsOf).join(', ') };
}

function place(
  step: Step,
  x: number,
  marks: Mark[],
  yOf: (isotope: string) => number,
  bottom: number,
  observe: string,
): number {
  if ('pulse' in step) {
    const { on, flip, phase, seconds } = step.pulse;
    const width = seconds ? 22 : Math.min(16, Math.max(4, Math.abs(flip) / 18));
    const label = `${+flip.toPrecision(4)}\u00b0${axis(phase)}`;
    marks.push({ kind: 'bar', x: x + 8, y: yOf(on), width, height: TALLEST, label, soft: seconds !== undefined });
    return x + width + 24;
  }
  if ('delay' in step) {
    marks.push({ kind: 'word', x: x + 20, y: bottom + 14, label: time(step.delay) });
    return x + 40;
  }
  if ('saturate' in step) {
    const { nucleus, seconds } = step.saturate;
    marks.push({ kind: 'bar', x, y: yOf(observe), width: 46, height: 9, label: `saturate ${nucleus}`, soft: true });
    marks.push({ kind: 'word', x: x + 23, y: bottom + 14, label: time(seconds) });
    return x + 62;
  }
  if ('acquire' in step) {
    marks.push({ kind: 'signal', path: signal(x + 4, yOf(observe)) });
    return x + 74;
  }
  const label =
    'spoil' in step
      ? 'spoil'
      : 'select' in step
        ? `order ${step.select.order}`
        : `decouple ${step.decouple.join(' ') || 'off'}`;
  marks.push({ kind: 'word', x: x + 24, y: bottom + 14, label });
  return x + 50;
}

/** A decaying oscillation. */
function signal(x: number, y: number): string {
  const points = Array.from({ length: 61 }, (_, k) => {
    const height = 15 * Math.exp(-k / 22) * Math.cos((2 * Math.PI * k) / 12);
    return `${(x + k).toFixed(1)} ${(y - height).toFixed(1)}`;
  });
  return `M${points.join('L')}`;
}

function axis(phase: number): string {
  const turned = ((phase % 360) + 360) % 360;
  return (
    ({ 0: 'x', 90: 'y', 180: '\u2212x', 270: '\u2212y' } as Record<number, string>)[turned] ?? ` at ${turned}\u00b0`
  );
}

function time(seconds: number): string {
  if (seconds >= 1) return `${+seconds.toPrecision(3)} s`;
  if (seconds >= 1e-3) return `${+(seconds * 1e3).toPrecision(3)} ms`;
  return `${+(seconds * 1e6).toPrecision(3)} \u00b5s`;
}

function wordsOf(step: Step): string {
  if ('pulse' in step) return `${step.pulse.flip} degree pulse on ${step.pulse.on}`;
  if ('delay' in step) return `delay ${time(step.delay)}`;
  if ('saturate' in step) return `saturate ${step.saturate.nucleus}`;
  if ('acquire' in step) return 'acquire';
  if ('spoil' in step) return 'spoil';
  return 'select' in step ? `select order ${step.select.order}` : `decouple ${step.decouple.join(' ') || 'nothing'}`;
}
