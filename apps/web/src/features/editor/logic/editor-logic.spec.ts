import { readSystem, type SpinSystemInput } from '@heddle/shared';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { draftKey, dropDraft, loadDraft, sameDraft, storeDraft } from './autosave';
import { cellKey, checkDraft } from './check';
import { compareDocuments, mergeDocuments } from './compare';
import { EMPTY_DRAFT, fromDocument, type Draft } from './draft';
import { addRow, followRename, moveRow, removeRow, setCell, setField, setPairJ } from './edit';
import { COUPLING_COLUMNS, NUCLEUS_COLUMNS } from './fields';
import { moveInGrid, nextCell } from './grid';
import { record, redo, startHistory, undo } from './history';
import { readNumber, stepNumber } from './numbers';
import { pasteBlock, splitCells } from './paste';

/** A document that uses every field of the format. */
const FULL: SpinSystemInput = {
  format: 'heddle.spin-system/1',
  name: 'Everything',
  notes: 'two lines\nof notes',
  nuclei: [
    { id: 'Ha', isotope: '1H', count: 1, shift: 5.82, lineWidth: 0.8, t1: 2.1, t2: 0.9, position: [0, 0, 0] },
    { id: "H'b", isotope: '1H', count: 3, shift: -1e-7 },
    {
      id: 'N',
      isotope: '14N',
      count: 1,
      shift: -340,
      quadrupole: { cq: -3.2e6, eta: 0.1, euler: [1, 2, 3] },
      csa: { span: 12, skew: -0.5, euler: [0, 90, 0] },
      position: [1, 1.5, -2],
    },
  ],
  couplings: [
    { between: ['Ha', "H'b"], j: -10.4 },
    { between: ['Ha', 'N'], j: 0, dipolar: 'positions' },
    { between: ["H'b", 'N'], j: 2 },
  ],
  states: [
    { id: 's1', population: 0.25, shifts: { Ha: 5.9 }, j: { "Ha,H'b": 9.8 } },
    { id: 's2', population: 0.75, shifts: {}, j: {} },
  ],
  exchange: [{ from: 's1', to: 's2', eyring: { enthalpy: 55, entropy: -10 } }],
  tumbling: { tauC: 4e-9 },
};

const abx = (): Draft =>
  fromDocument({
    format: 'heddle.spin-system/1',
    name: 'ABX',
    nuclei: [
      { id: 'A', isotope: '1H', shift: 5 },
      { id: 'B', isotope: '1H', shift: 5.1 },
      { id: 'X', isotope: '1H', shift: 7 },
    ],
    couplings: [
      { between: ['A', 'B'], j: 12 },
      { between: ['B', 'X'], j: 3 },
    ],
  });

describe('a draft', () => {
  it('says the same document again, with every field of the format', () => {
    expect(readSystem(FULL).ok).toBe(true);
    expect(checkDraft(fromDocument(FULL)).system).toEqual(FULL);
  });

  it('keeps a bad value as typed and puts its error at the cell', () => {
    const start = abx();
    const bad = setCell(start, 'nuclei', start.nuclei[1].key, 'shift', '5,1');
    const { system, errors } = checkDraft(bad);
    expect(system).toBeNull();
    expect(bad.nuclei[1].cells.shift).toBe('5,1');
    expect(errors.cells.get(cellKey('nuclei', bad.nuclei[1].key, 'shift'))).toBe(
      "write '5,1' with a decimal point: 5.1",
    );
    expect(errors.all).toEqual([{ place: 'nucleus B, shift', message: "write '5,1' with a decimal point: 5.1" }]);
  });

  it('leaves blank rows out and still finds the cell of an error below them', () => {
    const start = addRow(abx(), 'nuclei', {}, 0);
    const bad = setCell(start, 'nuclei', start.nuclei[3].key, 'isotope', '1X');
    const { errors, document } = checkDraft(bad);
    expect((document.nuclei as unknown[]).length).toBe(3);
    expect(errors.cells.get(cellKey('nuclei', bad.nuclei[3].key, 'isotope'))).toMatch(/1X/);
  });

  it.each([
    ['a missing shift', { id: 'Q', isotope: '1H' }, 'shift', 'needs a value'],
    ['a count of zero', { id: 'Q', isotope: '1H', shift: '1', count: '0' }, 'count', 'must be at least 1'],
    ['a broken count', { id: 'Q', isotope: '1H', shift: '1', count: '1.5' }, 'count', 'must be a whole number'],
    [
      'a quadrupole on spin 1/2',
      { id: 'Q', isotope: '1H', shift: '1', 'quadrupole.cq': '1e5' },
      'quadrupole.cq',
      /spin 1\/2/,
    ],
    ['half a position', { id: 'Q', isotope: '1H', shift: '1', 'position.0': '1' }, 'position.1', 'needs a value'],
    ['an id taken already', { id: 'A', isotope: '1H', shift: '1' }, 'id', /used by an earlier nucleus/],
  ])('shows %s at its cell', (_, cells, field, message) => {
    const draft = addRow(abx(), 'nuclei', cells);
    expect(checkDraft(draft).errors.cells.get(cellKey('nuclei', draft.nuclei[3].key, field))).toMatch(message);
  });

  it('reads a dipolar cell as a word or as a constant with its angles', () => {
    let draft = abx();
    draft = setCell(draft, 'couplings', draft.couplings[0].key, 'dipolar', '-2500');
    draft = setCell(draft, 'couplings', draft.couplings[0].key, 'polar.0', '30');
    expect(checkDraft(draft).system?.couplings[0].dipolar).toEqual({ constant: -2500, polar: [30, 0] });
    draft = setCell(draft, 'couplings', draft.couplings[0].key, 'dipolar', 'far');
    expect(checkDraft(draft).errors.cells.get(cellKey('couplings', draft.couplings[0].key, 'dipolar'))).toMatch(
      /number of Hz/,
    );
  });
});

describe('edits', () => {
  it('carry a new id to the couplings, the overrides and the exchange that named the old one', () => {
    let draft = fromDocument(FULL);
    draft = followRename(setCell(draft, 'nuclei', draft.nuclei[0].key, 'id', 'H1'), 'nuclei', 'Ha', 'H1');
    draft = followRename(setCell(draft, 'states', draft.states[0].key, 'id', 'open'), 'states', 's1', 'open');
    const { system } = checkDraft(draft);
    expect(system?.couplings[0].between).toEqual(['H1', "H'b"]);
    expect(system?.states?.[0]).toMatchObject({ id: 'open', shifts: { H1: 5.9 }, j: { "H1,H'b": 9.8 } });
    expect(system?.exchange?.[0].from).toBe('open');
  });

  it('do not move couplings to another nucleus when an id passes through one that is taken', () => {
    const start = abx();
    const taken = setCell(start, 'nuclei', start.nuclei[1].key, 'id', 'A');
    expect(followRename(taken, 'nuclei', 'B', 'A')).toBe(taken);
  });

  it('remove with a nucleus its couplings and overrides, and nothing else', () => {
    const draft = fromDocument(FULL);
    const { system } = checkDraft(removeRow(draft, 'nuclei', draft.nuclei[0].key));
    expect(system?.couplings.map((coupling) => coupling.between)).toEqual([["H'b", 'N']]);
    expect(system?.states?.[0]).toMatchObject({ shifts: {}, j: {} });
  });

  it('move rows, and stop at the ends', () => {
    const draft = abx();
    expect(moveRow(draft, 'nuclei', draft.nuclei[0].key, -1)).toBe(draft);
    expect(moveRow(draft, 'nuclei', draft.nuclei[0].key, 1).nuclei.map((row) => row.cells.id)).toEqual(['B', 'A', 'X']);
  });

  it('set J of a pair whichever way round it is listed, and add it when it is not', () => {
    const draft = setPairJ(setPairJ(abx(), 'B', 'A', '11'), 'A', 'X', '1.5');
    expect(checkDraft(draft).system?.couplings).toEqual([
      { between: ['A', 'B'], j: 11 },
      { between: ['B', 'X'], j: 3 },
      { between: ['A', 'X'], j: 1.5 },
    ]);
  });
});

describe('history', () => {
  it('undoes the keystrokes of one cell together and any chain of edits exactly', () => {
    let history = startHistory('');
    for (const text of ['5', '5.', '5.8']) history = record(history, text, 'shift');
    history = record(history, '5.8!', 'other');
    expect(undo(history).present).toBe('5.8');
    expect(undo(undo(history)).present).toBe('');
    expect(redo(redo(undo(undo(history)))).present).toBe('5.8!');
    fc.assert(
      fc.property(fc.array(fc.integer(), { minLength: 1, maxLength: 50 }), (values) => {
        let all = startHistory(-1);
        for (const value of values) all = record(all, value);
        const end = all.present;
        while (all.past.length > 0) all = undo(all);
        expect(all.present).toBe(-1);
        while (all.future.length > 0) all = redo(all);
        expect(all.present).toBe(end);
      }),
    );
  });
});

describe('numbers', () => {
  it('reads what it writes', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(readNumber(String(value))).toEqual({ ok: true, value: value + 0 });
      }),
    );
  });

  it.each(['1,5', '1.234,5', '', '1 2', '0x10', 'Infinity', '5.8.2', '1e999'])('refuses %j', (text) => {
    expect(readNumber(text).ok).toBe(false);
  });

  it('steps by the step and keeps the decimals', () => {
    expect(stepNumber('5.820', 0.01)).toBe('5.830');
    expect(stepNumber('5', -0.01)).toBe('4.99');
    expect(stepNumber('0.1', -0.1)).toBe('0.0');
    expect(stepNumber('', 1)).toBe('1');
    expect(stepNumber('abc', 1)).toBe('abc');
  });
});

describe('pasting', () => {
  it('splits tabs, semicolons, commas and quotes, as spreadsheets write them', () => {
    expect(splitCells('a\tb\r\nc\td\r\n')).toEqual([
      ['a', 'b'],
      ['c', 'd'],
    ]);
    expect(splitCells('a;1,5\nb;2,5')).toEqual([
      ['a', '1,5'],
      ['b', '2,5'],
    ]);
    expect(splitCells('"a,1",b\n"say ""x""",c')).toEqual([
      ['a,1', 'b'],
      ['say "x"', 'c'],
    ]);
  });

  it('fills from the focused cell and adds the rows that are missing', () => {
    const { draft, rows } = pasteBlock(
      abx(),
      'nuclei',
      NUCLEUS_COLUMNS,
      { row: 2, column: 0 },
      'X\t1H\t1\t7.2\nY\t1H\t3\t1.1',
    );
    expect(rows).toBe(2);
    expect(checkDraft(draft).system?.nuclei.map(({ id, count, shift }) => [id, count, shift])).toEqual([
      ['A', 1, 5],
      ['B', 1, 5.1],
      ['X', 1, 7.2],
      ['Y', 3, 1.1],
    ]);
  });

  it('lets headings say where the columns go', () => {
    const text = 'shift (ppm)\tid\tisotope\n5.8\tHa\t1H\n6.4\tHb\t1H';
    const { draft } = pasteBlock(EMPTY_DRAFT, 'nuclei', NUCLEUS_COLUMNS, { row: 0, column: 0 }, text);
    expect(draft.nuclei.map((row) => row.cells)).toEqual([
      { shift: '5.8', id: 'Ha', isotope: '1H' },
      { shift: '6.4', id: 'Hb', isotope: '1H' },
    ]);
  });

  it('keeps localised decimals as pasted and refuses them at the cell', () => {
    const { draft } = pasteBlock(
      setField(EMPTY_DRAFT, 'name', 'n'),
      'nuclei',
      NUCLEUS_COLUMNS,
      { row: 0, column: 0 },
      'Ha\t1H\t1\t5,82',
    );
    expect(checkDraft(draft).errors.cells.get(cellKey('nuclei', draft.nuclei[0].key, 'shift'))).toMatch(
      /decimal point: 5.82/,
    );
  });

  it('says how many cells lay beyond the table', () => {
    expect(pasteBlock(abx(), 'couplings', COUPLING_COLUMNS, { row: 0, column: 1 }, 'B\t2\tx\ty').dropped).toBe(2);
  });
});

describe('the grid', () => {
  it.each([
    ['ArrowDown', false, [1, 1]],
    ['ArrowUp', false, [0, 1]],
    ['Home', false, [0, 0]],
    ['End', false, [0, 3]],
    ['Home', true, [0, 0]],
    ['End', true, [2, 3]],
  ])('%s (ctrl %s) moves from 0,1 to %j', (key, ctrl, [row, column]) => {
    expect(moveInGrid({ key, ctrl }, { row: 0, column: 1 }, 3, 4)).toEqual({ row, column });
  });

  it('never leaves the table', () => {
    const keys = ['ArrowUp', 'ArrowDown', 'ArrowLeft', 'ArrowRight', 'Home', 'End', 'PageUp', 'PageDown'];
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.constantFrom(...keys), fc.boolean())),
        fc.integer({ min: 1, max: 9 }),
        fc.integer({ min: 1, max: 9 }),
        (moves, rows, columns) => {
          let at = { row: 0, column: 0 };
          for (const [key, ctrl] of moves) at = moveInGrid({ key, ctrl }, at, rows, columns) ?? at;
          expect(at.row >= 0 && at.row < rows && at.column >= 0 && at.column < columns).toBe(true);
        },
      ),
    );
    expect(nextCell({ row: 0, column: 1 }, 2, 2, 1)).toEqual({ row: 1, column: 0 });
    expect(nextCell({ row: 1, column: 1 }, 2, 2, 1)).toBeNull();
  });
});

describe('the kept draft', () => {
  it('survives a reload, and is nothing when the store is broken', () => {
    localStorage.clear();
    const key = draftKey('lab', 'system');
    const draft = abx();
    expect(storeDraft(localStorage, key, { draft, basedOn: 3, savedAt: '2026-01-01T00:00:00Z' })).toBe(true);
    const loaded = loadDraft(localStorage, key);
    expect(loaded?.basedOn).toBe(3);
    expect(loaded && sameDraft(loaded.draft, draft)).toBe(true);
    expect(sameDraft(draft, setPairJ(draft, 'A', 'B', '12.5'))).toBe(false);
    localStorage.setItem(key, '{broken');
    expect(loadDraft(localStorage, key)).toBeNull();
    dropDraft(localStorage, key);
    expect(localStorage.getItem(key)).toBeNull();
  });
});

describe('two versions of a system', () => {
  const theirs: SpinSystemInput = {
    format: 'heddle.spin-system/1',
    name: 'Pair',
    nuclei: [
      { id: 'A', isotope: '1H', shift: 5 },
      { id: 'B', isotope: '1H', shift: 6 },
    ],
    couplings: [{ between: ['A', 'B'], j: 7 }],
  };
  const mine: SpinSystemInput = {
    ...theirs,
    name: 'Pair, warmed',
    nuclei: [theirs.nuclei[0], { id: 'B', isotope: '1H', shift: 6.2 }, { id: 'C', isotope: '13C', shift: 60 }],
    couplings: [{ between: ['B', 'A'], j: 8 }],
  };

  it('differ value by value, and a row that one lacks counts once', () => {
    expect(compareDocuments(theirs, mine).map(({ id, theirs: a, mine: b }) => [id, a, b])).toEqual([
      ['name', 'Pair', 'Pair, warmed'],
      ['nuclei/B/shift', '6', '6.2'],
      ['couplings/A,B/j', '7', '8'],
      ['nuclei/C', 'not there', 'there'],
    ]);
    expect(compareDocuments(theirs, theirs)).toEqual([]);
  });

  it('merge into theirs, into mine, and into any mixture', () => {
    const all = new Set(compareDocuments(theirs, mine).map(({ id }) => id));
    expect(mergeDocuments(theirs, mine, new Set())).toEqual(theirs);
    expect(compareDocuments(mine, mergeDocuments(theirs, mine, all))).toEqual([]);
    const some = mergeDocuments(theirs, mine, new Set(['couplings/A,B/j', 'nuclei/C']));
    expect(some.name).toBe('Pair');
    expect(some.couplings?.[0].j).toBe(8);
    expect(some.nuclei.map(({ id }) => id)).toEqual(['A', 'B', 'C']);
  });
});
