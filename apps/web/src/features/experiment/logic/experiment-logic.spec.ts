import { parseExperiment, parseSystem, type ExperimentInput } from '@heddle/shared';
import { describe, expect, it } from 'vitest';
import { previewOf } from '../../live/logic/preview';
import {
  checkExperimentDraft,
  choose,
  fromExperiment,
  setAsk,
  START_EXPERIMENT,
  startFor,
  withWindow,
} from './experiment-draft';
import { RECIPES, SAMPLES } from './recipes';
import { newStep } from './steps';
import { autoWindow } from './window';

const pair = parseSystem({
  format: 'heddle.spin-system/1',
  name: 'Pair',
  nuclei: [
    { id: 'Ha', isotope: '1H', shift: 6 },
    { id: 'Hb', isotope: '1H', count: 3, shift: 2 },
    { id: 'C', isotope: '13C', shift: 60 },
  ],
  couplings: [{ between: ['Ha', 'Hb'], j: 7 }],
});

describe('an experiment draft', () => {
  it('is sound from the start, for the isotope a system has most of', () => {
    expect(checkExperimentDraft(startFor(pair), pair).experiment?.observe).toBe('1H');
    const fluorine = parseSystem({
      format: 'heddle.spin-system/1',
      name: 'F',
      nuclei: [{ id: 'F', isotope: '19F', shift: -80 }],
    });
    expect(checkExperimentDraft(startFor(fluorine), fluorine).experiment?.observe).toBe('19F');
  });

  it.each(RECIPES.map(({ value }) => value))(
    'makes a sound document of the recipe %s from its usual values',
    (recipe) => {
      let draft = choose(setAsk(START_EXPERIMENT, 'observe', '13C'), 'sequence.recipe', recipe);
      if (recipe === 'noe-difference') draft = setAsk(draft, 'sequence.saturate', 'Ha');
      const { experiment, errors } = checkExperimentDraft(draft, pair);
      expect([...errors]).toEqual([]);
      expect(experiment?.sequence).toMatchObject({ recipe });
    },
  );

  it.each(SAMPLES.map(({ value }) => value))(
    'makes a sound document of the sample %s from its usual values',
    (kind) => {
      const { experiment, errors } = checkExperimentDraft(choose(START_EXPERIMENT, 'sample.kind', kind), pair);
      expect([...errors]).toEqual([]);
      expect(experiment?.sample.kind).toBe(kind);
    },
  );

  it('puts errors at the fields, keeping the text', () => {
    const draft = setAsk(setAsk(startFor(pair), 'protonMHz', '400,13'), 'acquisition.points', '');
    const { experiment, errors } = checkExperimentDraft(draft, pair);
    expect(experiment).toBeNull();
    expect(draft.cells.protonMHz).toBe('400,13');
    expect(errors.get('protonMHz')).toBe("write '400,13' with a decimal point: 400.13");
    expect(errors.get('acquisition.points')).toBe('needs a value');
    expect(checkExperimentDraft(setAsk(startFor(pair), 'observe', '19F'), pair).errors.get('observe')).toBe(
      'the system has no 19F',
    );
  });

  it('keeps what a recipe was given while another is looked at', () => {
    const cpmg = setAsk(choose(START_EXPERIMENT, 'sequence.recipe', 'cpmg'), 'sequence.loops', '40');
    const back = choose(choose(cpmg, 'sequence.recipe', 'pulse-acquire'), 'sequence.recipe', 'cpmg');
    expect(checkExperimentDraft(back, pair).experiment?.sequence).toEqual({ recipe: 'cpmg', tau: 0.01, loops: 40 });
  });

  it.each<[string, Partial<ExperimentInput>]>([
    [
      'a recipe',
      { sequence: { recipe: 'inept', from: '13C', j: -145, refocused: true, multiplicity: 2 }, decouple: ['13C'] },
    ],
    [
      'a spinning sample',
      { sample: { kind: 'spinning', rateHz: 8000, orientations: 100, angle: 30 }, quadrupoleOrder: 1 },
    ],
    ['a crystal', { sample: { kind: 'crystal', euler: [10, 20, 30] } }],
    [
      'free steps',
      {
        sequence: {
          steps: [
            { decouple: ['13C'] },
            { pulse: { on: '1H', flip: 90, phase: 0, seconds: 1e-5, offsetHz: 20 } },
            { delay: 0.01 },
            { spoil: true },
            { select: { on: '1H', order: -1 } },
            { saturate: { nucleus: 'Ha', seconds: 5, nutationHz: 50 } },
            { pulse: { on: '1H', flip: 90, phase: 90 } },
            { acquire: { phase: 0 } },
          ],
          phaseCycle: [
            [0, 0, 0],
            [180, 0, 180],
          ],
        },
      },
    ],
  ])('says again an experiment with %s', (_, more) => {
    const experiment = parseExperiment({
      format: 'heddle.experiment/1',
      protonMHz: 600.13,
      observe: '1H',
      acquisition: { centre: 4, width: 6000, points: 8192 },
      processing: { exponential: 0.5, zeroFill: 16384 },
      ...more,
    });
    expect(checkExperimentDraft(fromExperiment(experiment), pair).experiment).toEqual(experiment);
  });

  it('points to the step that is wrong', () => {
    const draft = {
      ...startFor(pair),
      steps: [{ ...newStep('pulse'), cells: { on: '1H', flip: 'x' } }, newStep('acquire')],
    };
    expect(checkExperimentDraft(draft, pair).errors.get('sequence.steps[0].pulse.flip')).toBe("'x' is not a number");
  });
});

describe('the window', () => {
  it('holds every line and follows the shifts until one is typed', () => {
    const window = autoWindow(pair, { observe: '1H', protonMHz: 400, lineWidth: 1, solid: false })!;
    expect(window.centre).toBeCloseTo(4, 1);
    expect(window.centre * 400 + window.width / 2).toBeGreaterThan(6 * 400 + 1.5 * 7);
    expect(window.centre * 400 - window.width / 2).toBeLessThan(2 * 400 - 0.5 * 7);
    expect(window.points / window.width).toBeGreaterThanOrEqual(3);
    const typed = setAsk(withWindow(startFor(pair), pair), 'acquisition.width', '900');
    expect(withWindow(typed, pair).cells['acquisition.width']).toBe('900');
  });

  it('is wide enough for the satellites of a whole spin: the horns of a 2H powder lie at 3/8 CQ, its edges at 3/4 CQ', () => {
    const deuterium = parseSystem({
      format: 'heddle.spin-system/1',
      name: 'D',
      nuclei: [{ id: 'D', isotope: '2H', shift: 0, quadrupole: { cq: 160000 } }],
    });
    expect(
      autoWindow(deuterium, { observe: '2H', protonMHz: 400, lineWidth: 100, solid: true })!.width,
    ).toBeGreaterThan(1.5 * 160000);
  });
});

it('a live picture has the same physics and no more points than a screen shows', () => {
  const experiment = parseExperiment({
    format: 'heddle.experiment/1',
    protonMHz: 600,
    observe: '1H',
    sample: { kind: 'powder', orientations: 50000 },
    acquisition: { centre: 4, width: 6000, points: 131072 },
  });
  const preview = previewOf(experiment);
  expect(preview).toEqual({
    ...experiment,
    sample: { kind: 'powder', orientations: 300 },
    acquisition: { ...experiment.acquisition, points: 32768 },
    processing: { ...experiment.processing, zeroFill: 32768 },
  });
});
