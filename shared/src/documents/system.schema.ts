import { z } from 'zod';
import { isIsotope } from '../nuclides/nuclides.js';
import { LIMITS } from './limits.js';

export const isotopeSchema = z.string().refine(isIsotope, {
  error: (issue) => `'${String(issue.input)}' is not an NMR-active nuclide of the table; write it like 13C`,
});

const ID_RULE = "an id starts with a letter and holds at most 16 letters, digits, ', _ or -";
export const idSchema = z.string().regex(/^[A-Za-z][A-Za-z0-9'_-]{0,15}$/, ID_RULE);

/** Euler angles a, b, g in degrees of the active rotation Rz(a) Ry(b) Rz(g). */
export const eulerSchema = z.tuple([z.number(), z.number(), z.number()]);

const noRotation: [number, number, number] = [0, 0, 0];

const csaSchema = z.strictObject({
  span: z.number().min(0).describe('ppm, d11 - d33'),
  skew: z.number().min(-1).max(1).default(0).describe('3 (d22 - iso) / span'),
  euler: eulerSchema.default(noRotation),
});

const quadrupoleSchema = z.strictObject({
  cq: z.number().describe('e2qQ/h, Hz, of either sign'),
  eta: z.number().min(0).max(1).default(0),
  euler: eulerSchema.default(noRotation),
});

const nucleusSchema = z.strictObject({
  id: idSchema,
  isotope: isotopeSchema,
  count: z.int().min(1).max(LIMITS.groupCount).default(1),
  shift: z.number().describe('ppm'),
  csa: csaSchema.optional(),
  quadrupole: quadrupoleSchema.optional(),
  position: z.tuple([z.number(), z.number(), z.number()]).optional().describe('angstrom'),
  lineWidth: z.number().min(0).optional().describe('full width at half height, Hz'),
  t1: z.number().positive().optional().describe('s'),
  t2: z.number().positive().optional().describe('s'),
});

const dipolarSchema = z.union([
  z.literal('positions'),
  z.strictObject({
    constant: z.number().describe('Hz, negative for two protons'),
    polar: z.tuple([z.number(), z.number()]).default([0, 0]).describe('theta and phi of the axis, degrees'),
  }),
]);

const couplingSchema = z.strictObject({
  between: z.tuple([z.string(), z.string()]),
  j: z.number().default(0).describe('Hz, with its sign'),
  dipolar: dipolarSchema.optional(),
});

const stateSchema = z.strictObject({
  id: idSchema,
  population: z.number().gt(0).max(1),
  shifts: z.record(z.string(), z.number()).default({}),
  j: z.record(z.string(), z.number()).default({}),
});

const exchangeSchema = z.strictObject({
  from: z.string(),
  to: z.string(),
  rate: z.number().min(0).optional().describe('forward, s^-1'),
  eyring: z
    .strictObject({ enthalpy: z.number().describe('kJ/mol'), entropy: z.number().describe('J/(mol K)') })
    .optional(),
});

export const spinSystemSchema = z.strictObject({
  format: z.literal('heddle.spin-system/1'),
  name: z.string().min(1).max(LIMITS.name),
  notes: z.string().max(LIMITS.notes).optional(),
  nuclei: z.array(nucleusSchema).min(1),
  couplings: z.array(couplingSchema).default([]),
  states: z.array(stateSchema).min(2).max(LIMITS.states).optional(),
  exchange: z.array(exchangeSchema).optional(),
  tumbling: z.strictObject({ tauC: z.number().positive().describe('s') }).optional(),
});

/** A spin system with every default filled in. */
export type SpinSystem = z.output<typeof spinSystemSchema>;
/** A spin system as a person writes it. */
export type SpinSystemInput = z.input<typeof spinSystemSchema>;
export type Nucleus = SpinSystem['nuclei'][number];
export type Coupling = SpinSystem['couplings'][number];
export type ExchangeState = NonNullable<SpinSystem['states']>[number];
export type ExchangeStep = NonNullable<SpinSystem['exchange']>[number];
export type Euler = z.output<typeof eulerSchema>;
