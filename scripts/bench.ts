/** Times the engine on the ladder of cases and, where asked for, general-purpose scripts on the same cases beside it. */
import { parseArgs } from 'node:util';
import { listCases, loadCase } from './bench/cases.js';
import { compare, timeEngine, type Timing } from './bench/engine.js';
import { findPython, peersOf, runPeer } from './bench/peers.js';
import { printHeader, printRow, type Row } from './bench/table.js';

const USAGE = `Usage: npm run bench -- [--cases TEXT] [--repeat N] [--peer] [--slow] [--json]

  --cases TEXT   only cases whose name contains TEXT, like solution or exchange-4
  --repeat N     runs of each, the best of which counts; default 3
  --peer         run the scripts of scripts/peers too, taking turns with the engine, and print ratios; needs Debian's
                 python3-numpy, python3-scipy and libopenblas0-pthread. One thread on both sides.
  --slow         with --peer: also peers that take tens of seconds
  --json         print rows as JSON instead of the table

Seconds are those of the computation: starting, importing and reading are not counted. 'first' is the engine's first run
in this process, before anything is compiled; 'accuracy' the largest difference from the peer's spectrum over its largest point.
`;

const { values: options } = parseArgs({
  options: {
    cases: { type: 'string', default: '' },
    repeat: { type: 'string', default: '3' },
    peer: { type: 'boolean', default: false },
    slow: { type: 'boolean', default: false },
    json: { type: 'boolean', default: false },
    help: { type: 'boolean', short: 'h', default: false },
  },
});

function main(): void {
  if (options.help) {
    process.stdout.write(USAGE);
    return;
  }
  const repeat = Number(options.repeat);
  if (!Number.isInteger(repeat) || repeat < 1)
    throw new Error(`--repeat takes a whole number from 1 on, not '${options.repeat}'`);
  const names = listCases().filter((name) => name.includes(options.cases));
  if (names.length === 0) throw new Error(`no case contains '${options.cases}'`);
  const python = options.peer ? findPython() : null;
  if (!options.json) printHeader(python !== null);
  const rows: Row[] = [];
  for (const name of names) {
    for (const row of benchCase(name, repeat, python)) {
      rows.push(row);
      if (!options.json) printRow(row);
    }
  }
  if (options.json) process.stdout.write(`${JSON.stringify(rows, null, 1)}\n`);
}

/** One row without peers, else one row a peer. Engine and peers take turns, so that both meet the same machine. */
function benchCase(name: string, repeat: number, python: string | null): Row[] {
  const pair = loadCase(name);
  const peers = python ? peersOf(name, options.slow) : [];
  const engine: Timing[] = [];
  const seconds = peers.map(() => Infinity);
  const accuracy = peers.map(() => NaN);
  for (let turn = 0; turn < repeat; turn++) {
    engine.push(timeEngine(pair));
    peers.forEach((peer, i) => {
      if (peer.slow && turn > 0) return;
      const reply = runPeer(python!, peer, name);
      seconds[i] = Math.min(seconds[i], reply.seconds);
      accuracy[i] = compare(engine[turn].result.spectrum, reply.spectrum);
    });
  }
  const best = Math.min(...engine.map((timing) => timing.seconds));
  const { method, dimensions } = engine[0].result.report;
  const row = { case: name, method, dimensions, first: engine[0].seconds, best };
  if (peers.length === 0) return [row];
  return peers.map((peer, i) => ({
    ...row,
    peer: peer.title,
    peerSeconds: seconds[i],
    ratio: seconds[i] / best,
    accuracy: accuracy[i],
  }));
}

try {
  main();
} catch (error) {
  process.stderr.write(`${(error as Error).message}\n`);
  process.exitCode = 1;
}
