import { convert } from 'jcampconverter';
import { asText, eventually, experiment, startHarness, system, type Browser, type Harness } from './harness.js';

let harness: Harness;
let owner: Browser;
let systemId: string;
beforeAll(async () => {
  harness = await startHarness();
  owner = await harness.member('owner', 'chemist');
  systemId = (await owner.post(`/labs/${harness.labId}/systems`, { document: system('Varied pair'), shared: true }))
    .body.id;
});
afterAll(() => harness.close());

const series = (rest = '') => `/labs/${harness.labId}/series${rest}`;
const make = (vary: object) =>
  owner.post(series(), { name: 'Over J', systemId, revision: 1, experiment: experiment(400, 512), vary });

it('runs one system along a quantity and gives all spectra in one file', async () => {
  const made = await make({ quantity: 'coupling', target: 'Hb,Ha', values: [0, 5, 10] });
  expect(made.status).toBe(201);
  const done = await eventually(async () => {
    const { body } = await owner.get(series(`/${made.body.id}`));
    return body.runs.every((run: { state: string }) => run.state === 'done') && body;
  });
  expect(done.runs).toHaveLength(3);
  const couplings = await Promise.all(
    done.runs.map(async (run: { id: string }) => {
      const result = await owner.get(`/labs/${harness.labId}/runs/${run.id}/result`);
      return result.body.system.couplings[0].j as number;
    }),
  );
  expect(couplings).toEqual([0, 5, 10]);
  const [head, first] = (await owner.get(series(`/${done.id}/series.csv`))).text.split('\r\n');
  expect(head).toBe('ppm,coupling 0 Hz,coupling 5 Hz,coupling 10 Hz');
  expect(first.split(',')).toHaveLength(4);
  const jcamp = (
    await owner
      .get(series(`/${done.id}/series.jdx`))
      .buffer(true)
      .parse(asText)
  ).body as string;
  expect(convert(jcamp).flatten.filter(({ spectra }) => spectra.length > 0)).toHaveLength(3);
});

it('refuses a quantity that the documents do not have, and values that make no sense', async () => {
  const none = await make({ quantity: 'spinning', values: [1000, 2000] });
  expect([none.status, none.body.errors[0].path]).toEqual([422, 'vary.quantity']);
  const negative = await make({ quantity: 'field', values: [400, -1] });
  expect([negative.status, negative.body.errors[0].path]).toEqual([422, 'vary.values[1]']);
  expect((await make({ quantity: 'field', values: [400] })).body.errors[0].path).toBe('vary.values');
});
