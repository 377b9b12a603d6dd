import type { ExperimentInput, SpinSystemInput, Variation } from '@heddle/shared';

/** A system of the demonstration lab with the experiments that are run on it. Compounds and numbers are invented. */
export interface DemoSystem {
  owner: 'chemist' | 'instructor' | 'leader';
  shared: boolean;
  note: string;
  system: Omit<SpinSystemInput, 'format'>;
  experiments: Omit<ExperimentInput, 'format'>[];
}

const proton = (protonMHz: number, centre: number, width: number, points = 16384): Omit<ExperimentInput, 'format'> => ({
  name: `1H at ${protonMHz} MHz`,
  protonMHz,
  observe: '1H',
  lineWidth: 0.8,
  acquisition: { centre, width, points },
  processing: { zeroFill: 2 * points },
});

const positions = (distance: number): [number, number, number][] => [
  [0, 0, 0],
  [0, 0, distance],
];

export const DEMO_SYSTEMS: readonly DemoSystem[] = [
  {
    owner: 'chemist',
    shared: true,
    note: 'Couplings from the first batch',
    system: {
      name: 'Marrow lactone, vinyl end',
      notes: 'Three vinyl protons and the methine beside them.',
      nuclei: [
        { id: 'Ha', isotope: '1H', shift: 5.82 },
        { id: 'Hb', isotope: '1H', shift: 5.21 },
        { id: 'Hc', isotope: '1H', shift: 5.14 },
        { id: 'Hd', isotope: '1H', shift: 4.37 },
      ],
      couplings: [
        { between: ['Ha', 'Hb'], j: 17.1 },
        { between: ['Ha', 'Hc'], j: 10.4 },
        { between: ['Hb', 'Hc'], j: 1.5 },
        { between: ['Ha', 'Hd'], j: 6.2 },
      ],
    },
    experiments: [proton(400.13, 5, 1600), { ...proton(60.2, 5, 300, 8192), name: '1H on the benchtop magnet' }],
  },
  {
    owner: 'chemist',
    shared: true,
    note: 'For the benchtop comparison',
    system: {
      name: 'Sorrel ether, ethyl and aryl part',
      nuclei: [
        { id: 'CH3', isotope: '1H', shift: 1.24, count: 3 },
        { id: 'CH2', isotope: '1H', shift: 3.61, count: 2 },
        { id: 'Ho1', isotope: '1H', shift: 7.31 },
        { id: 'Ho2', isotope: '1H', shift: 7.31 },
        { id: 'Hm1', isotope: '1H', shift: 6.88 },
        { id: 'Hm2', isotope: '1H', shift: 6.88 },
      ],
      couplings: [
        { between: ['CH3', 'CH2'], j: 7.05 },
        { between: ['Ho1', 'Hm1'], j: 8.6 },
        { between: ['Ho2', 'Hm2'], j: 8.6 },
        { between: ['Ho1', 'Hm2'], j: 0.4 },
        { between: ['Ho2', 'Hm1'], j: 0.4 },
        { between: ['Ho1', 'Ho2'], j: 2.4 },
        { between: ['Hm1', 'Hm2'], j: 2.7 },
      ],
    },
    experiments: [proton(400.13, 4.3, 3200, 32768), proton(80.1, 4.3, 800)],
  },
  {
    owner: 'chemist',
    shared: false,
    note: 'Still guessing the 31P couplings',
    system: {
      name: 'Phosphonate Q-7 core',
      nuclei: [
        { id: 'P', isotope: '31P', shift: 22.4 },
        { id: 'F', isotope: '19F', shift: -118.2 },
        { id: 'H1', isotope: '1H', shift: 4.92 },
        { id: 'H2', isotope: '1H', shift: 2.18, count: 2 },
      ],
      couplings: [
        { between: ['P', 'F'], j: 74 },
        { between: ['P', 'H1'], j: 11.2 },
        { between: ['P', 'H2'], j: 18.6 },
        { between: ['F', 'H1'], j: 47.3 },
        { between: ['H1', 'H2'], j: 6.9 },
      ],
    },
    experiments: [
      { ...proton(400.13, 3.5, 1600), name: '1H with both heteronuclei' },
      {
        name: '31P without decoupling',
        protonMHz: 400.13,
        observe: '31P',
        lineWidth: 1.5,
        acquisition: { centre: 22, width: 1200, points: 8192 },
        processing: { zeroFill: 16384 },
      },
    ],
  },
  {
    owner: 'instructor',
    shared: true,
    note: 'For the second-year class',
    system: {
      name: 'Harbour alcohol, carbon skeleton',
      nuclei: [
        { id: 'C1', isotope: '13C', shift: 61.8 },
        { id: 'H1', isotope: '1H', shift: 3.66, count: 2 },
        { id: 'C2', isotope: '13C', shift: 32.1 },
        { id: 'H2', isotope: '1H', shift: 1.58, count: 2 },
        { id: 'C3', isotope: '13C', shift: 14.2 },
        { id: 'H3', isotope: '1H', shift: 0.94, count: 3 },
      ],
      couplings: [
        { between: ['C1', 'H1'], j: 141 },
        { between: ['C2', 'H2'], j: 125 },
        { between: ['C3', 'H3'], j: 124.5 },
      ],
    },
    experiments: [
      {
        name: '13C, protons decoupled',
        protonMHz: 400.13,
        observe: '13C',
        decouple: ['1H'],
        lineWidth: 1,
        acquisition: { centre: 40, width: 8000, points: 32768 },
      },
      {
        name: '13C edited by multiplicity, last pulse 135 degrees',
        protonMHz: 400.13,
        observe: '13C',
        decouple: [],
        lineWidth: 1,
        sequence: { recipe: 'dept', from: '1H', j: 130, theta: 135 },
        acquisition: { centre: 40, width: 8000, points: 16384 },
      },
    ],
  },
  {
    owner: 'instructor',
    shared: true,
    note: 'Slow to fast exchange for the kinetics afternoon',
    system: {
      name: 'Rowan amide, two sites',
      notes: 'Two methyl groups that change places; the barrier is invented.',
      nuclei: [
        { id: 'Me1', isotope: '1H', shift: 2.96, count: 3 },
        { id: 'Me2', isotope: '1H', shift: 2.81, count: 3 },
      ],
      states: [
        { id: 'near', population: 0.5 },
        { id: 'far', population: 0.5, shifts: { Me1: 2.81, Me2: 2.96 } },
      ],
      exchange: [{ from: 'near', to: 'far', eyring: { enthalpy: 72, entropy: -4 } }],
    },
    experiments: [
      { ...proton(400.13, 2.9, 400, 4096), name: '1H at 298 K', temperature: 298.15 },
      { ...proton(400.13, 2.9, 400, 4096), name: '1H at 350 K', temperature: 350 },
    ],
  },
  {
    owner: 'leader',
    shared: true,
    note: 'Proton broadened by its nitrogen',
    system: {
      name: 'Thistle amine NH',
      nuclei: [
        { id: 'N', isotope: '14N', shift: 60, quadrupole: { cq: 1.1e6, eta: 0.3 } },
        { id: 'H', isotope: '1H', shift: 6.4 },
      ],
      couplings: [{ between: ['N', 'H'], j: 62 }],
      tumbling: { tauC: 2e-11 },
    },
    experiments: [{ ...proton(400.13, 6.4, 800, 4096), name: '1H, relaxed by 14N', relaxation: 'redfield' }],
  },
  {
    owner: 'leader',
    shared: true,
    note: 'For T1 planning',
    system: {
      name: 'Quarry solvent, relaxation pair',
      nuclei: [
        { id: 'C', isotope: '13C', shift: 128.4, t1: 3.2, t2: 1.1, position: [0, 0, 0] },
        { id: 'H', isotope: '1H', shift: 7.2, t1: 4.5, t2: 2, position: [0, 0, 1.09] },
      ],
      couplings: [{ between: ['C', 'H'], j: 160, dipolar: 'positions' }],
      tumbling: { tauC: 5e-11 },
    },
    experiments: [
      {
        name: '13C, 2 s after inversion',
        protonMHz: 400.13,
        observe: '13C',
        relaxation: 't1-t2',
        sequence: { recipe: 'inversion-recovery', delay: 2 },
        acquisition: { centre: 128, width: 2000, points: 8192 },
      },
    ],
  },
  {
    owner: 'leader',
    shared: true,
    note: 'Tensor from the literature search',
    system: {
      name: 'Basalt carbonyl, static tensor',
      nuclei: [{ id: 'C', isotope: '13C', shift: 171, csa: { span: 152, skew: 0.21 } }],
    },
    experiments: [
      {
        name: '13C, static powder',
        protonMHz: 400.13,
        observe: '13C',
        sample: { kind: 'powder', orientations: 4000 },
        lineWidth: 120,
        acquisition: { centre: 171, width: 40000, points: 2048 },
        processing: { zeroFill: 4096 },
      },
      {
        name: '13C, spinning at 3 kHz',
        protonMHz: 400.13,
        observe: '13C',
        sample: { kind: 'spinning', rateHz: 3000, orientations: 600 },
        lineWidth: 60,
        acquisition: { centre: 171, width: 40000, points: 4096 },
        processing: { zeroFill: 8192 },
      },
    ],
  },
  {
    owner: 'leader',
    shared: true,
    note: 'Central transition at the fields we can book',
    system: {
      name: 'Felspar aluminium site',
      nuclei: [{ id: 'Al', isotope: '27Al', shift: 58.5, quadrupole: { cq: 4.6e6, eta: 0.35 } }],
    },
    experiments: [400.13, 600.13, 800.13].map((protonMHz) => ({
      name: `27Al, static, ${protonMHz} MHz`,
      protonMHz,
      observe: '27Al',
      sample: { kind: 'powder' as const, orientations: 4000 },
      lineWidth: 300,
      acquisition: { centre: 20, width: 60000, points: 2048 },
      processing: { zeroFill: 4096 },
    })),
  },
  {
    owner: 'chemist',
    shared: true,
    note: 'Two protons of bound water',
    system: {
      name: 'Gypsum-like water pair',
      nuclei: positions(1.58).map((position, i) => ({ id: `H${i + 1}`, isotope: '1H', shift: 4.8, position })),
      couplings: [{ between: ['H1', 'H2'], dipolar: 'positions' }],
    },
    experiments: [
      {
        ...proton(400.13, 4.8, 200000, 2048),
        name: '1H, static powder',
        sample: { kind: 'powder', orientations: 4000 },
        lineWidth: 2500,
      },
    ],
  },
  {
    owner: 'chemist',
    shared: true,
    note: 'Negative ratio: the multiplet must not be mirrored',
    system: {
      name: 'Larch silane',
      nuclei: [
        { id: 'Si', isotope: '29Si', shift: -17.5 },
        { id: 'H1', isotope: '1H', shift: 4.02 },
        { id: 'Me', isotope: '1H', shift: 0.28, count: 6 },
      ],
      couplings: [
        { between: ['Si', 'H1'], j: -188 },
        { between: ['Si', 'Me'], j: 6.6 },
        { between: ['H1', 'Me'], j: 3.7 },
      ],
    },
    experiments: [
      {
        name: '29Si, coupled',
        protonMHz: 400.13,
        observe: '29Si',
        lineWidth: 1,
        acquisition: { centre: -17, width: 1000, points: 8192 },
        processing: { zeroFill: 16384 },
      },
    ],
  },
  {
    owner: 'instructor',
    shared: true,
    note: 'Spin 3/2 partner',
    system: {
      name: 'Ember borate',
      nuclei: [
        { id: 'B', isotope: '11B', shift: 1.4, lineWidth: 3 },
        { id: 'F', isotope: '19F', shift: -151.3, count: 4 },
      ],
      couplings: [{ between: ['B', 'F'], j: 12.4 }],
    },
    experiments: [
      {
        name: '19F, four lines from 11B',
        protonMHz: 400.13,
        observe: '19F',
        lineWidth: 1.5,
        acquisition: { centre: -151.3, width: 600, points: 4096 },
        processing: { zeroFill: 8192 },
      },
    ],
  },
];

/** Series of the demonstration lab; `of` is the name of the system. */
export const DEMO_SERIES: readonly {
  of: string;
  name: string;
  experiment: Omit<ExperimentInput, 'format'>;
  vary: Variation & { values: number[] };
}[] = [
  {
    of: 'Rowan amide, two sites',
    name: 'Coalescence over temperature',
    experiment: { ...proton(400.13, 2.9, 400, 4096), name: '1H over temperature' },
    vary: { quantity: 'temperature', values: [280, 300, 310, 320, 330, 340, 350, 360, 380, 400] },
  },
  {
    of: 'Basalt carbonyl, static tensor',
    name: 'Sidebands over spinning rate',
    experiment: {
      name: '13C, spinning',
      protonMHz: 400.13,
      observe: '13C',
      sample: { kind: 'spinning', rateHz: 2000, orientations: 400 },
      lineWidth: 60,
      acquisition: { centre: 171, width: 40000, points: 4096 },
      processing: { zeroFill: 8192 },
    },
    vary: { quantity: 'spinning', values: [1000, 2000, 4000, 8000, 16000] },
  },
];
