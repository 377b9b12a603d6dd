import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { casePath } from './cases.js';

/** Debian's own interpreter: the first python3 of the path may be another build with its own numpy. */
const PYTHON = '/usr/bin/python3';
const folder = fileURLToPath(new URL('../peers/', import.meta.url));

/** One general-purpose script with its options. */
export interface Peer {
  title: string;
  script: string;
  options: string[];
  /** Takes tens of seconds on this case: run once, and only when asked for. */
  slow: boolean;
}

/** Variables that pin an OpenBLAS kernel are removed, and one thread is set. */
function environment(): NodeJS.ProcessEnv {
  const { OPENBLAS_CORETYPE: _core, OPENBLAS_L2_SIZE: _cache, ...rest } = process.env;
  return { ...rest, OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1', PYTHONDONTWRITEBYTECODE: '1' };
}

/** The interpreter, if it has what the peers need. Throws with the packages to install. */
export function findPython(): string {
  const found = spawnSync(PYTHON, ['-c', 'import numpy, scipy.sparse'], { env: environment() });
  if (found.status === 0) return PYTHON;
  throw new Error('--peer needs: apt-get install python3-numpy python3-scipy libopenblas0-pthread');
}

/** The peers that do a case, fastest method of their kind first. */
export function peersOf(name: string, withSlow: boolean): Peer[] {
  const peer = (script: string, slow = false, ...options: string[]): Peer => ({
    title: [script, ...options.slice(1)].join(' '),
    script,
    options,
    slow,
  });
  const liouville = (method: string, slow = false) => peer('liouville_sparse', slow, '--method', method);
  const size = Number(/\d+$/.exec(name)?.[0]);
  const all: Peer[] = [];
  if (/^(solution|groups)/.test(name)) all.push(peer('blocked_eigh'), peer('dense_eigh', size >= 12));
  if (/^(exchange|relaxation)/.test(name)) all.push(liouville('dense', size >= 6), liouville('expm'));
  if (/^exchange/.test(name)) all.push(liouville('splu', size >= 5));
  if (/^powder/.test(name)) all.push(peer('powder_vectorised'));
  if (/^spinning/.test(name)) all.push(peer('mas_floquet'));
  return all.filter((candidate) => withSlow || !candidate.slow);
}

export interface PeerReply {
  seconds: number;
  spectrum: { real: number[]; imag: number[] };
}

export function runPeer(python: string, { script, options }: Peer, name: string): PeerReply {
  const scratch = mkdtempSync(join(tmpdir(), 'heddle-bench-'));
  try {
    const out = join(scratch, 'result.json');
    const documents = ['--system', casePath(name, 'system'), '--experiment', casePath(name, 'experiment')];
    const args = [`${folder}${script}.py`, ...documents, ...options, '--out', out];
    const done = spawnSync(python, args, { env: environment(), encoding: 'utf8' });
    if (done.status !== 0) throw new Error(`${script} failed on ${name}: ${done.stderr.trim().split('\n').pop()}`);
    const { seconds } = JSON.parse(done.stdout) as { seconds: number };
    const { spectrum } = JSON.parse(readFileSync(out, 'utf8')) as Pick<PeerReply, 'spectrum'>;
    return { seconds, spectrum };
  } finally {
    rmSync(scratch, { recursive: true });
  }
}
