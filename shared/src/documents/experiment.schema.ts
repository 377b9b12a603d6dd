import { z } from 'zod';
import { LIMITS } from './limits.js';
import { eulerSchema, idSchema, isotopeSchema } from './system.schema.js';

const phase = z.number().default(0).describe('degrees');
const duration = z.number().min(0).describe('s');

const pulseSchema = z.strictObject({
  on: isotopeSchema,
  flip: z.number().describe('degrees'),
  phase,
  seconds: z.number().positive().optional().describe('rectangular pulse of this length; without it ideal'),
  offsetHz: z.number().optional(),
});

export const stepSchema = z.union([
  z.strictObject({ pulse: pulseSchema }),
  z.strictObject({ delay: duration }),
  z.strictObject({ spoil: z.literal(true) }),
  z.strictObject({ select: z.strictObject({ on: isotopeSchema, order: z.int() }) }),
  z.strictObject({ decouple: z.array(isotopeSchema) }),
  z.strictObject({
    saturate: z.strictObject({ nucleus: idSchema, seconds: z.number().positive(), nutationHz: z.number().positive() }),
  }),
  z.strictObject({ acquire: z.strictObject({ phase }) }),
]);

const j = z
  .number()
  .refine((value) => value !== 0, 'a transfer needs a coupling that is not zero')
  .describe('Hz');

export const recipeSchema = z.discriminatedUnion('recipe', [
  z.strictObject({ recipe: z.literal('pulse-acquire'), flip: z.number().default(90) }),
  z.strictObject({ recipe: z.literal('spin-echo'), tau: duration }),
  z.strictObject({ recipe: z.literal('cpmg'), tau: duration, loops: z.int().min(1).max(LIMITS.echoLoops) }),
  z.strictObject({ recipe: z.literal('inversion-recovery'), delay: duration }),
  z.strictObject({ recipe: z.literal('saturation-recovery'), delay: duration }),
  z.strictObject({ recipe: z.literal('quadrupole-echo'), tau: duration }),
  z.strictObject({
    recipe: z.literal('inept'),
    from: isotopeSchema,
    j,
    refocused: z.boolean().default(false),
    multiplicity: z.union([z.literal(1), z.literal(2), z.literal(3)]).default(1),
  }),
  z.strictObject({ recipe: z.literal('dept'), from: isotopeSchema, j, theta: z.number() }),
  z.strictObject({ recipe: z.literal('noe-difference'), saturate: idSchema, time: z.number().positive() }),
  z.strictObject({ recipe: z.literal('cross-polarisation-ideal'), from: isotopeSchema }),
]);

const stepsSchema = z.strictObject({
  steps: z.array(stepSchema).min(1).max(LIMITS.steps),
  phaseCycle: z.array(z.array(z.number())).min(1).max(LIMITS.phaseCycleRows).optional(),
});

/** The magic angle in degrees, acos(1/sqrt 3). */
export const MAGIC_ANGLE = (Math.acos(1 / Math.sqrt(3)) * 180) / Math.PI;

const orientations = z.int().min(1).max(LIMITS.orientations);

const sampleSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('solution') }),
  z.strictObject({ kind: z.literal('powder'), orientations }),
  z.strictObject({
    kind: z.literal('spinning'),
    rateHz: z.number().positive(),
    orientations,
    gammas: z.int().min(1).max(LIMITS.gammas).optional(),
    angle: z.number().min(0).max(90).default(MAGIC_ANGLE).describe('rotor axis to field, degrees'),
  }),
  z.strictObject({ kind: z.literal('crystal'), euler: eulerSchema }),
]);

const processingSchema = z.strictObject({
  exponential: z.number().default(0).describe('Hz'),
  gaussian: z.number().min(0).default(0).describe('Hz'),
  zeroFill: z.int().min(0).max(LIMITS.zeroFill).default(0).describe('total points; 0: as acquired'),
  phase0: z.number().default(0).describe('degrees'),
  phase1: z.number().default(0).describe('degrees over the width'),
});

export const experimentSchema = z.strictObject({
  format: z.literal('heddle.experiment/1'),
  name: z.string().max(LIMITS.name).optional(),
  protonMHz: z.number().positive(),
  observe: isotopeSchema,
  decouple: z.array(isotopeSchema).default([]),
  temperature: z.number().positive().default(298.15).describe('K'),
  sample: sampleSchema.default({ kind: 'solution' }),
  sequence: z.union([recipeSchema, stepsSchema]).default({ recipe: 'pulse-acquire', flip: 90 }),
  relaxation: z.enum(['line-width', 't1-t2', 'redfield']).default('line-width'),
  lineWidth: z.number().min(0).default(1).describe('Hz, for nuclei that give none'),
  quadrupoleOrder: z.union([z.literal(1), z.literal(2)]).default(2),
  acquisition: z.strictObject({
    centre: z.number().describe('ppm'),
    width: z.number().positive().describe('Hz'),
    points: z.int().min(2).max(LIMITS.points),
  }),
  processing: processingSchema.default({ exponential: 0, gaussian: 0, zeroFill: 0, phase0: 0, phase1: 0 }),
  method: z.enum(['auto', 'blocks', 'liouville', 'orientations']).default('auto'),
});

/** An experiment with every default filled in. */
export type Experiment = z.output<typeof experimentSchema>;
/** An experiment as a person writes it. */
export type ExperimentInput = z.input<typeof experimentSchema>;
export type Recipe = z.output<typeof recipeSchema>;
export type Step = z.output<typeof stepSchema>;
export type Sample = Experiment['sample'];
export type Acquisition = Experiment['acquisition'];
export type Processing = Experiment['processing'];
export type FreeSequence = z.output<typeof stepsSchema>;
