import { nuclide } from '../nuclides/nuclides.js';
import { formatPath, type DocumentError } from './errors.js';
import type { Coupling, Nucleus, SpinSystem } from './system.schema.js';

/** Two nuclei closer than this, in angstrom, count as one place. */
const COINCIDENT = 0.01;

/** The two ids of a `j` key of a state, 'Ha,Hb'. */
export function splitPair(key: string): [string, string] | null {
  const parts = key.split(',').map((part) => part.trim());
  return parts.length === 2 ? [parts[0], parts[1]] : null;
}

export function sortedPair(a: string, b: string): string {
  return a < b ? `${a},${b}` : `${b},${a}`;
}

/** The rules that hold between the fields of one spin system. */
export function checkSystem(system: SpinSystem): DocumentError[] {
  const errors: DocumentError[] = [];
  const refuse = (keys: readonly PropertyKey[], message: string) => errors.push({ path: formatPath(keys), message });
  const nuclei = new Map(system.nuclei.map((nucleus) => [nucleus.id, nucleus]));

  requireUnique(
    system.nuclei.map((nucleus) => nucleus.id),
    (i) => refuse(['nuclei', i, 'id'], `'${system.nuclei[i].id}' is used by an earlier nucleus`),
  );
  system.nuclei.forEach((nucleus, i) => checkNucleus(nucleus, i, system.nuclei, refuse));
  checkCouplings(system.couplings, nuclei, refuse);
  checkStates(system, nuclei, refuse);
  checkExchange(system, refuse);
  return errors;
}

type Refuse = (keys: readonly PropertyKey[], message: string) => void;

function requireUnique(values: readonly string[], repeated: (index: number) => void): void {
  values.forEach((value, i) => {
    if (values.indexOf(value) < i) repeated(i);
  });
}

function checkNucleus(nucleus: Nucleus, i: number, all: readonly Nucleus[], refuse: Refuse): void {
  if (nucleus.quadrupole && nuclide(nucleus.isotope).spin < 1) {
    refuse(['nuclei', i, 'quadrupole'], `${nucleus.isotope} has spin 1/2 and no quadrupole moment`);
  }
  if (nucleus.count > 1 && nucleus.csa) refuse(['nuclei', i, 'csa'], 'a group of equivalent nuclei takes no tensor');
  if (nucleus.count > 1 && nucleus.quadrupole)
    refuse(['nuclei', i, 'quadrupole'], 'a group of equivalent nuclei takes no tensor');
  if (nucleus.t1 !== undefined && nucleus.t2 !== undefined && nucleus.t2 > 2 * nucleus.t1) {
    refuse(['nuclei', i, 't2'], 't2 is at most twice t1');
  }
  const twin = all.findIndex((other, k) => k < i && samePlace(other, nucleus));
  if (twin >= 0) refuse(['nuclei', i, 'position'], `is the place of ${all[twin].id} already`);
}

function samePlace(a: Nucleus, b: Nucleus): boolean {
  if (!a.position || !b.position) return false;
  return Math.hypot(...a.position.map((x, axis) => x - b.position![axis])) < COINCIDENT;
}

function checkCouplings(couplings: readonly Coupling[], nuclei: ReadonlyMap<string, Nucleus>, refuse: Refuse): void {
  couplings.forEach((coupling, i) => {
    const [a, b] = coupling.between;
    [a, b].forEach((id, end) => {
      if (!nuclei.has(id)) refuse(['couplings', i, 'between', end], `there is no nucleus '${id}'`);
    });
    if (a === b) refuse(['couplings', i, 'between'], 'a coupling joins two different nuclei');
    if (coupling.dipolar === undefined) return;
    const ends = [nuclei.get(a), nuclei.get(b)];
    if (ends.some((end) => end && end.count > 1)) {
      refuse(['couplings', i, 'dipolar'], 'a group of equivalent nuclei takes no dipolar coupling');
    }
    if (coupling.dipolar === 'positions') {
      ends.forEach((end) => {
        if (end && !end.position) refuse(['couplings', i, 'dipolar'], `${end.id} has no position`);
      });
    }
  });
  requireUnique(
    couplings.map(({ between: [a, b] }) => sortedPair(a, b)),
    (i) => refuse(['couplings', i, 'between'], 'this pair is listed already'),
  );
}

function checkStates(system: SpinSystem, nuclei: ReadonlyMap<string, Nucleus>, refuse: Refuse): void {
  const states = system.states;
  if (!states) return;
  requireUnique(
    states.map((state) => state.id),
    (i) => refuse(['states', i, 'id'], `'${states[i].id}' is used by an earlier state`),
  );
  const total = states.reduce((sum, state) => sum + state.population, 0);
  if (Math.abs(total - 1) > 1e-6) refuse(['states'], `the populations sum to ${+total.toPrecision(9)}, not to 1`);
  states.forEach((state, i) => {
    for (const id of Object.keys(state.shifts)) {
      if (!nuclei.has(id)) refuse(['states', i, 'shifts', id], `there is no nucleus '${id}'`);
    }
    const seen = new Set<string>();
    for (const key of Object.keys(state.j)) {
      const pair = splitPair(key);
      const known = pair !== null && pair[0] !== pair[1] && pair.every((id) => nuclei.has(id));
      if (!known) refuse(['states', i, 'j', key], 'write the ids of two different nuclei with a comma between');
      else if (seen.has(sortedPair(...pair))) refuse(['states', i, 'j', key], 'this pair is listed already');
      else seen.add(sortedPair(...pair));
    }
  });
}

function checkExchange(system: SpinSystem, refuse: Refuse): void {
  const steps = system.exchange ?? [];
  if (steps.length > 0 && !system.states) refuse(['exchange'], 'exchange needs the states it runs between');
  const states = new Set(system.states?.map((state) => state.id));
  steps.forEach((step, i) => {
    for (const end of ['from', 'to'] as const) {
      if (!states.has(step[end])) refuse(['exchange', i, end], `there is no state '${step[end]}'`);
    }
    if (step.from === step.to) refuse(['exchange', i, 'to'], 'exchange joins two different states');
    if (step.rate === undefined && !step.eyring) refuse(['exchange', i, 'rate'], 'give a rate or Eyring parameters');
    if (step.rate !== undefined && step.eyring)
      refuse(['exchange', i, 'rate'], 'give a rate or Eyring parameters, not both');
  });
  requireUnique(
    steps.map((step) => sortedPair(step.from, step.to)),
    (i) =>
      refuse(['exchange', i], 'this pair of states is listed already; the backward rate follows from the populations'),
  );
}
