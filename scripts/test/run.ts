/** Runs the steps of `npm test` one after the other and sums up. Arguments: names of steps, or --list. */
import { spawn } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { countsFile, STEPS, type Step } from './steps.js';

const root = fileURLToPath(new URL('../..', import.meta.url));

interface Outcome {
  step: Step;
  passed: number;
  failed: number;
  seconds: number;
}

/** A step that takes longer is stopped and failed. */
const STEP_SECONDS = 600;

async function runStep(step: Step): Promise<Outcome> {
  process.stdout.write(`\n--- ${step.title}\n`);
  if (step.counts) rmSync(countsFile(step.counts), { force: true });
  const started = performance.now();
  const code = await runCommand(step);
  const seconds = (performance.now() - started) / 1000;
  const counted = step.counts ? readCounts(step.counts) : { passed: code === 0 ? 1 : 0, failed: code === 0 ? 0 : 1 };
  // A runner that dies without naming a failed test, or that ran none, has failed all the same.
  const failed = code !== 0 || counted.passed === 0 ? Math.max(1, counted.failed) : counted.failed;
  process.stdout.write(`--- ${step.title}: ${failed > 0 ? 'FAILED' : 'ok'}, ${seconds.toFixed(1)} s\n`);
  return { step, passed: counted.passed, failed, seconds };
}

function runCommand({ command: [program, ...args], folder = '.', env }: Step): Promise<number> {
  const isScript = program.startsWith('node_modules/');
  const child = spawn(isScript ? process.execPath : program, isScript ? [`${root}${program}`, ...args] : args, {
    cwd: `${root}${folder}`,
    env: { ...process.env, FORCE_COLOR: '0', ...env },
    stdio: ['ignore', 'inherit', 'inherit'],
    timeout: STEP_SECONDS * 1000,
  });
  return new Promise((resolve) => {
    child.on('error', (error) => {
      process.stderr.write(`${error.message}\n`);
      resolve(1);
    });
    child.on('exit', (code) => resolve(code ?? 1));
  });
}

function readCounts(name: string): { passed: number; failed: number } {
  try {
    const report = JSON.parse(readFileSync(countsFile(name), 'utf8')) as Record<string, number | undefined>;
    const brokenFiles = report['numRuntimeErrorTestSuites'] ?? 0;
    return { passed: report['numPassedTests'] ?? 0, failed: (report['numFailedTests'] ?? 0) + brokenFiles };
  } catch {
    return { passed: 0, failed: 1 };
  }
}

async function main(names: string[]): Promise<void> {
  if (names.includes('--list')) {
    for (const step of STEPS) process.stdout.write(`${step.name.padEnd(15)} ${step.title}\n`);
    return;
  }
  const unknown = names.filter((name) => !STEPS.some((step) => step.name === name));
  if (unknown.length > 0) throw new Error(`there is no step ${unknown.join(', ')}; --list shows them`);
  mkdirSync(countsFile(''), { recursive: true });
  const outcomes: Outcome[] = [];
  for (const step of STEPS) if (names.length === 0 || names.includes(step.name)) outcomes.push(await runStep(step));
  summarise(outcomes);
}

function summarise(outcomes: Outcome[]): void {
  process.stdout.write('\n');
  for (const { step, passed, failed, seconds } of outcomes) {
    const mark = failed > 0 ? 'FAILED' : 'ok';
    process.stdout.write(
      `${mark.padEnd(7)} ${step.title.padEnd(34)} ${`${passed} passed, ${failed} failed`.padEnd(26)} ${seconds.toFixed(1)} s\n`,
    );
  }
  const total = (pick: (outcome: Outcome) => number) => outcomes.reduce((sum, outcome) => sum + pick(outcome), 0);
  process.stdout.write(`\n${total((o) => o.seconds).toFixed(0)} s in all\n`);
  process.stdout.write(`${total((o) => o.passed)} passed, ${total((o) => o.failed)} failed\n`);
  process.exitCode = total((o) => o.failed) > 0 ? 1 : 0;
}

await main(process.argv.slice(2));
