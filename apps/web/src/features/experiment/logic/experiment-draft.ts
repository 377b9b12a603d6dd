import {
  checkPair,
  readExperiment,
  type DocumentError,
  type Experiment,
  type ExperimentInput,
  type SpinSystem,
} from '@heddle/shared';
import { readNumber, writeNumber } from '../../editor/logic/numbers';
import { RECIPES, SAMPLES, type Ask } from './recipes';
import { readSteps, writeSteps, type StepRow } from './steps';
import { autoWindow } from './window';

/** An experiment while it is edited: the text of every field as typed, by document path joined by dots. */
export interface ExperimentDraft {
  readonly cells: Readonly<Record<string, string>>;
  readonly decouple: readonly string[];
  /** The window follows the shifts until a person types one. */
  readonly autoWindow: boolean;
  /** Free steps in place of a recipe. */
  readonly steps: readonly StepRow[] | null;
  /** Phases of the cycle, one row a line, numbers apart by blanks. */
  readonly phaseCycle: string;
}

const STARTS: Readonly<Record<string, string>> = {
  protonMHz: '400',
  observe: '1H',
  temperature: '298.15',
  'sample.kind': 'solution',
  'sequence.recipe': 'pulse-acquire',
  'sequence.flip': '90',
  relaxation: 'line-width',
  lineWidth: '1',
  quadrupoleOrder: '2',
  'acquisition.centre': '5',
  'acquisition.width': '4800',
  'acquisition.points': '16384',
};

export const START_EXPERIMENT: ExperimentDraft = {
  cells: STARTS,
  decouple: [],
  autoWindow: true,
  steps: null,
  phaseCycle: '',
};

/** The experiment a system starts with: its 1H spectrum, or that of its most numerous isotope. */
export function startFor(system: SpinSystem | null): ExperimentDraft {
  const counts = new Map<string, number>();
  for (const { isotope, count } of system?.nuclei ?? []) counts.set(isotope, (counts.get(isotope) ?? 0) + count);
  const [most] = [...counts].sort((a, b) => b[1] - a[1]);
  const observe = counts.has('1H') || !most ? '1H' : most[0];
  return setAsk(START_EXPERIMENT, 'observe', observe);
}

export function setAsk(draft: ExperimentDraft, field: string, text: string): ExperimentDraft {
  const typed = field.startsWith('acquisition.');
  return { ...draft, cells: { ...draft.cells, [field]: text }, autoWindow: typed ? false : draft.autoWindow };
}

/** Chooses a recipe or a kind of sample; what it asks for starts with usual values and keeps what was typed before. */
export function choose(
  draft: ExperimentDraft,
  field: 'sequence.recipe' | 'sample.kind',
  value: string,
): ExperimentDraft {
  const offers = field === 'sequence.recipe' ? RECIPES : SAMPLES;
  const cells: Record<string, string> = { ...draft.cells, [field]: value };
  for (const ask of offers.find((offer) => offer.value === value)?.asks ?? []) cells[ask.field] ??= ask.start;
  return { ...draft, cells, steps: field === 'sequence.recipe' ? null : draft.steps };
}

export function asksOf(draft: ExperimentDraft, field: 'sequence.recipe' | 'sample.kind'): readonly Ask[] {
  const offers = field === 'sequence.recipe' ? RECIPES : SAMPLES;
  return offers.find((offer) => offer.value === draft.cells[field])?.asks ?? [];
}

/** The draft with the window that follows from the system, when nobody has typed one. */
export function withWindow(draft: ExperimentDraft, system: SpinSystem | null): ExperimentDraft {
  if (!draft.autoWindow || !system) return draft;
  const [protonMHz, lineWidth] = [readNumber(draft.cells.protonMHz ?? ''), readNumber(draft.cells.lineWidth ?? '')];
  if (!protonMHz.ok || !(protonMHz.value > 0)) return draft;
  const window = autoWindow(system, {
    observe: draft.cells.observe,
    protonMHz: protonMHz.value,
    lineWidth: lineWidth.ok ? lineWidth.value : 1,
    solid: draft.cells['sample.kind'] !== 'solution',
  });
  if (!window) return draft;
  const cells = {
    ...draft.cells,
    'acquisition.centre': writeNumber(window.centre),
    'acquisition.width': writeNumber(window.width),
    'acquisition.points': writeNumber(window.points),
  };
  return Object.entries(cells).every(([field, text]) => draft.cells[field] === text) ? draft : { ...draft, cells };
}

export function fromExperiment(experiment: ExperimentInput): ExperimentDraft {
  const { decouple = [], sequence, format: _, ...rest } = experiment;
  const cells: Record<string, string> = { ...STARTS };
  const put = (prefix: string, value: unknown): void => {
    if (typeof value === 'object' && value !== null) {
      for (const [key, inner] of Object.entries(value)) put(prefix === '' ? key : `${prefix}.${key}`, inner);
    } else if (typeof value === 'number') cells[prefix] = writeNumber(value);
    else if (typeof value === 'string' || typeof value === 'boolean') cells[prefix] = String(value);
  };
  put('', rest);
  if (sequence && 'steps' in sequence) {
    const phaseCycle = (sequence.phaseCycle ?? []).map((row) => row.join(' ')).join('\n');
    return { cells, decouple, autoWindow: false, steps: writeSteps(sequence.steps), phaseCycle };
  }
  put('sequence', sequence);
  return { cells, decouple, autoWindow: false, steps: null, phaseCycle: '' };
}

const NUMBER_FIELDS = new Set(['protonMHz', 'temperature', 'lineWidth', 'quadrupoleOrder']);
const PROCESSING = ['exponential', 'gaussian', 'zeroFill', 'phase0', 'phase1'];

export interface CheckedExperiment {
  readonly experiment: Experiment | null;
  /** By document path. */
  readonly errors: ReadonlyMap<string, string>;
  /** What the experiment asks of the system and the system lacks. */
  readonly systemErrors: readonly DocumentError[];
}

/** Reads and checks the draft, alone and (when there is one) against the system. */
export function checkExperimentDraft(draft: ExperimentDraft, system: SpinSystem | null): CheckedExperiment {
  const unread = new Map<string, string>();
  const result = readExperiment(toExperimentDocument(draft, unread));
  const errors = new Map<string, string>();
  const note = ({ path, message }: DocumentError) => {
    const said = unread.get(path) ?? (/received undefined$/.test(message) ? 'needs a value' : message);
    if (!errors.has(path)) errors.set(path, said);
  };
  if (!result.ok) {
    result.errors.forEach(note);
    return { experiment: null, errors, systemErrors: [] };
  }
  if (!system) return { experiment: result.value, errors, systemErrors: [] };
  const pair = checkPair(system, result.value);
  pair.experiment.forEach(note);
  const sound = pair.experiment.length === 0 && pair.system.length === 0;
  return { experiment: sound ? result.value : null, errors, systemErrors: pair.system };
}

function toExperimentDocument(draft: ExperimentDraft, unread: Map<string, string>): Record<string, unknown> {
  const { cells } = draft;
  const number = (field: string): unknown => {
    const text = (cells[field] ?? '').trim();
    if (text === '') return undefined;
    const read = readNumber(text);
    if (read.ok) return read.value;
    unread.set(field.replace(/\.(\d+)/g, '[$1]'), read.message);
    return text;
  };
  const asked = (ask: Ask): unknown => {
    const text = cells[ask.field] ?? ask.start;
    if (ask.kind === 'switch') return text === 'true';
    return ask.kind === 'isotope' || ask.kind === 'nucleus' ? text : number(ask.field);
  };
  const fill = (target: Record<string, unknown>, prefix: string, asks: readonly Ask[]) => {
    for (const ask of asks) {
      const key = ask.field.slice(prefix.length + 1);
      const value = asked(ask);
      if (value === undefined) continue;
      if (key.startsWith('euler.')) ((target.euler ??= [0, 0, 0]) as unknown[])[Number(key.slice(6))] = value;
      else target[key] = value;
    }
    return target;
  };

  const document: Record<string, unknown> = {
    format: 'heddle.experiment/1',
    observe: cells.observe,
    decouple: [...draft.decouple],
  };
  if ((cells.name ?? '').trim() !== '') document.name = cells.name.trim();
  for (const field of NUMBER_FIELDS) document[field] = number(field);
  document.relaxation = cells.relaxation;
  document.sample = fill({ kind: cells['sample.kind'] }, 'sample', asksOf(draft, 'sample.kind'));
  document.sequence = draft.steps
    ? readSteps(draft.steps, draft.phaseCycle, unread)
    : fill({ recipe: cells['sequence.recipe'] }, 'sequence', asksOf(draft, 'sequence.recipe'));
  document.acquisition = {
    centre: number('acquisition.centre'),
    width: number('acquisition.width'),
    points: number('acquisition.points'),
  };
  document.processing = Object.fromEntries(
    PROCESSING.map((key) => [key, number(`processing.${key}`)]).filter(([, value]) => value !== undefined),
  );
  if (cells.method !== undefined) document.method = cells.method;
  return document;
}
