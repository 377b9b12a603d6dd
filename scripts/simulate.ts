/** The headless command: one pair of documents, or a folder of pairs, through the engine without server or database. */
import { parseArgs } from 'node:util';
import { runBatch } from './headless/batch.js';
import { OptionRefused, reportFailure } from './headless/failures.js';
import { runPair } from './headless/pair.js';
import { isForm, FORMS, writeResult } from './headless/write.js';

const USAGE = `Usage: npm run --silent simulate -- --system S.json --experiment E.json [--out R.json] [--as ${FORMS.join('|')}]
       npm run --silent simulate -- --batch DIR [--as ${FORMS.join('|')}]

Simulates the spectrum of a spin system (heddle.spin-system/1) in an experiment (heddle.experiment/1).

  --system FILE       the spin system
  --experiment FILE   the experiment
  --out FILE          where the result goes; standard output without it
  --as FORM           json: the whole result document (default); jcamp: JCAMP-DX 5.01; csv: ppm,real,imag
  --batch DIR         every NAME.system.json with its NAME.experiment.json in DIR, on all cores;
                      writes NAME.result.json (.jdx, .csv) beside each
  --help              this text

Exit code: 0 done; 2 a document or an option is refused, with the paths of the fields on standard error, one a line,
zero-based like nuclei[1].shift; 1 anything else.
`;

async function main(): Promise<number> {
  const options = readOptions();
  if (options.help) {
    process.stdout.write(USAGE);
    return 0;
  }
  const form = options.as ?? 'json';
  if (!isForm(form)) throw new OptionRefused(`--as takes ${FORMS.join(', ')}, not '${form}'`);
  if (options.batch !== undefined) {
    const pairOption = (['system', 'experiment', 'out'] as const).find((name) => options[name] !== undefined);
    if (pairOption) throw new OptionRefused(`--${pairOption} does not go with --batch`);
    return runBatch(options.batch, form);
  }
  for (const name of ['system', 'experiment'] as const) {
    if (options[name] === undefined) throw new OptionRefused(`--${name} FILE is missing (see --help)`);
  }
  const result = runPair(options.system!, options.experiment!, progressLine());
  await writeResult(result, form, options.out);
  return 0;
}

function readOptions() {
  try {
    return parseArgs({
      options: {
        system: { type: 'string' },
        experiment: { type: 'string' },
        out: { type: 'string' },
        as: { type: 'string' },
        batch: { type: 'string' },
        help: { type: 'boolean', short: 'h' },
      },
    }).values;
  } catch (error) {
    throw new OptionRefused((error as Error).message);
  }
}

/** Shows the fraction done on standard error, if that is a terminal. */
function progressLine(): (fraction: number) => void {
  if (!process.stderr.isTTY) return () => {};
  let shown = -1;
  return (fraction) => {
    const percent = Math.floor(100 * fraction);
    if (percent === shown) return;
    shown = percent;
    process.stderr.write(percent >= 100 ? '\r\x1b[K' : `\rsimulating ${percent} %`);
  };
}

// A reader that closes the pipe early (head, less) is no failure.
process.stdout.on('error', (error: NodeJS.ErrnoException) => process.exit(error.code === 'EPIPE' ? 0 : 1));

try {
  process.exitCode = await main();
} catch (error) {
  process.exitCode = reportFailure(error);
}
