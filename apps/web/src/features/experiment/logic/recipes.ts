/** A value that a part of the experiment asks for; `field` is its path in the document, joined by dots. */
export interface Ask {
  readonly field: string;
  readonly label: string;
  readonly unit?: string;
  readonly kind: 'number' | 'isotope' | 'nucleus' | 'switch' | 'choice';
  readonly choices?: readonly string[];
  /** What the form starts with. */
  readonly start: string;
  readonly step?: number;
  /** May stay empty. */
  readonly optional?: boolean;
  readonly hint?: string;
}

export interface Offer {
  readonly value: string;
  readonly label: string;
  readonly asks: readonly Ask[];
}

const seconds = (field: string, label: string, start: string): Ask => ({
  field,
  label,
  unit: 's',
  kind: 'number',
  start,
  step: 0.001,
});
const flip: Ask = { field: 'sequence.flip', label: 'Flip angle', unit: '\u00b0', kind: 'number', start: '90', step: 5 };
const from: Ask = { field: 'sequence.from', label: 'Transfer from', kind: 'isotope', start: '1H' };
const j: Ask = { field: 'sequence.j', label: 'J for the delays', unit: 'Hz', kind: 'number', start: '145', step: 1 };
const tau: Ask = {
  ...seconds('sequence.tau', 'Half echo', '0.01'),
  hint: 'from the first pulse to the middle of the echo',
};

/** The recipes of the contract, in words. */
export const RECIPES: readonly Offer[] = [
  { value: 'pulse-acquire', label: 'Pulse and acquire', asks: [flip] },
  { value: 'spin-echo', label: 'Spin echo', asks: [tau] },
  {
    value: 'cpmg',
    label: 'CPMG echo train',
    asks: [tau, { field: 'sequence.loops', label: 'Echoes', kind: 'number', start: '8', step: 1 }],
  },
  {
    value: 'inversion-recovery',
    label: 'Inversion recovery',
    asks: [seconds('sequence.delay', 'Recovery delay', '1')],
  },
  {
    value: 'saturation-recovery',
    label: 'Saturation recovery',
    asks: [seconds('sequence.delay', 'Recovery delay', '1')],
  },
  { value: 'quadrupole-echo', label: 'Quadrupole echo', asks: [{ ...tau, start: '0.00003', step: 0.00001 }] },
  {
    value: 'inept',
    label: 'INEPT',
    asks: [
      from,
      j,
      { field: 'sequence.refocused', label: 'Refocused', kind: 'switch', start: 'false' },
      {
        field: 'sequence.multiplicity',
        label: 'Refocus for',
        kind: 'choice',
        choices: ['1', '2', '3'],
        start: '1',
        hint: 'attached nuclei',
      },
    ],
  },
  {
    value: 'dept',
    label: 'DEPT',
    asks: [
      from,
      j,
      { field: 'sequence.theta', label: 'Last pulse', unit: '\u00b0', kind: 'number', start: '135', step: 45 },
    ],
  },
  {
    value: 'noe-difference',
    label: 'NOE difference',
    asks: [
      { field: 'sequence.saturate', label: 'Saturate', kind: 'nucleus', start: '' },
      { ...seconds('sequence.time', 'For', '5'), step: 0.5 },
    ],
  },
  { value: 'cross-polarisation-ideal', label: 'Ideal cross-polarisation', asks: [from] },
];

const orientations: Ask = {
  field: 'sample.orientations',
  label: 'Orientations',
  kind: 'number',
  start: '1000',
  step: 100,
};
const angle = (index: number, label: string): Ask => ({
  field: `sample.euler.${index}`,
  label,
  unit: '\u00b0',
  kind: 'number',
  start: '0',
  step: 5,
});

/** The kinds of sample of the contract, in words. */
export const SAMPLES: readonly Offer[] = [
  { value: 'solution', label: 'Solution', asks: [] },
  { value: 'powder', label: 'Powder, static', asks: [orientations] },
  {
    value: 'spinning',
    label: 'Powder, spinning',
    asks: [
      { field: 'sample.rateHz', label: 'Spinning rate', unit: 'Hz', kind: 'number', start: '10000', step: 500 },
      { ...orientations, start: '300' },
      {
        field: 'sample.gammas',
        label: 'Rotor phases',
        kind: 'number',
        start: '',
        step: 4,
        optional: true,
        hint: 'empty: averaged exactly',
      },
      {
        field: 'sample.angle',
        label: 'Rotor angle',
        unit: '\u00b0',
        kind: 'number',
        start: '',
        step: 0.1,
        optional: true,
        hint: 'empty: the magic angle',
      },
    ],
  },
  { value: 'crystal', label: 'Single crystal', asks: [angle(0, 'a'), angle(1, 'b'), angle(2, 'g')] },
];

export const RELAXATIONS: readonly { value: string; label: string }[] = [
  { value: 'line-width', label: 'Line widths only' },
  { value: 't1-t2', label: 'T1 and T2 of each nucleus' },
  { value: 'redfield', label: 'From molecular tumbling (Redfield)' },
];
