import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { strFromU8, unzipSync } from 'fflate';
import { asBytes, eventually, experiment, startHarness, system, type Browser, type Harness } from './harness.js';

let harness: Harness;
let owner: Browser;
let run: string;
beforeAll(async () => {
  harness = await startHarness();
  owner = await harness.member('owner', 'chemist');
  const systemId = (
    await owner.post(`/labs/${harness.labId}/systems`, { document: system('Briefed pair'), shared: true })
  ).body.id;
  const made = await owner.post(`/labs/${harness.labId}/runs`, { systemId, revision: 1, experiment: experiment() });
  run = `/labs/${harness.labId}/runs/${made.body.id}`;
  await eventually(async () => (await owner.get(run)).body.state === 'done');
});
afterAll(() => harness.close());

/** The words and the number of pages of a PDF, read by poppler. */
function readPdf(bytes: Buffer): { text: string; pages: number } {
  const folder = mkdtempSync(join(tmpdir(), 'heddle-pdf-'));
  try {
    const file = join(folder, 'brief.pdf');
    writeFileSync(file, bytes);
    const text = execFileSync('pdftotext', ['-layout', file, '-'], { encoding: 'utf8' });
    const info = execFileSync('pdfinfo', [file], { encoding: 'utf8' });
    return { text, pages: Number(/Pages:\s+(\d+)/.exec(info)![1]) };
  } finally {
    rmSync(folder, { recursive: true });
  }
}

it('is a PDF of one or two pages that says what to set, what to look for and what to mind', async () => {
  const reply = await owner.get(`${run}/brief.pdf`).buffer(true).parse(asBytes);
  expect(reply.headers['content-type']).toBe('application/pdf');
  const { text, pages } = readPdf(reply.body as Buffer);
  expect(pages).toBeLessThanOrEqual(2);
  for (const words of [
    'Briefed pair',
    '2000 Hz',
    'What to look for',
    'Ha',
    'What this run leaves out',
    'implants',
    'licensed operator',
  ]) {
    expect(text).toContain(words);
  }
});

it('comes in a package whose every file has the size and hash that the crate says', async () => {
  const reply = await owner.get(`${run}/package.eln`).buffer(true).parse(asBytes);
  const files = unzipSync(new Uint8Array(reply.body as Buffer));
  const [root] = [...new Set(Object.keys(files).map((path) => path.split('/')[0]))];
  expect(Object.keys(files).every((path) => path.startsWith(`${root}/`))).toBe(true);
  const { '@graph': graph } = JSON.parse(strFromU8(files[`${root}/ro-crate-metadata.json`]));
  const find = (id: string) => graph.find((node: { '@id': string }) => node['@id'] === id);
  expect(find(find('ro-crate-metadata.json').about['@id'])).toMatchObject({ '@type': 'Dataset', name: 'Briefed pair' });
  const parts = find('./run/').hasPart as { '@id': string }[];
  expect(parts).toHaveLength(6);
  for (const { '@id': id } of parts) {
    const bytes = files[`${root}/${id.slice(2)}`];
    expect(find(id)).toMatchObject({
      contentSize: String(bytes.length),
      sha256: createHash('sha256').update(bytes).digest('hex'),
    });
  }
  expect(JSON.parse(strFromU8(files[`${root}/run/system.json`])).nuclei[0].id).toBe('Ha');
});

it('does not exist for another lab', async () => {
  const stranger = await harness.member('stranger', 'admin', await harness.newLab('Elsewhere'));
  expect((await stranger.get(`${run}/brief.pdf`)).status).toBe(404);
});
