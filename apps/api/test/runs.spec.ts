import { get } from 'node:http';
import type { AddressInfo } from 'node:net';
import { convert } from 'jcampconverter';
import { DataSource } from 'typeorm';
import { RunEntity } from '../src/runs/run.entity.js';
import { NEXT, RUN_STATES, statesBefore } from '../src/runs/run.states.js';
import {
  asBytes,
  asText,
  eventually,
  experiment,
  startHarness,
  system,
  type Browser,
  type Harness,
} from './harness.js';

let harness: Harness;
let owner: Browser;
let systemId: string;
beforeAll(async () => {
  harness = await startHarness();
  owner = await harness.member('owner', 'chemist');
  systemId = (await owner.post(`/labs/${harness.labId}/systems`, { document: system('Pair'), shared: true })).body.id;
});
afterAll(() => harness.close());

const runs = (rest = '') => `/labs/${harness.labId}/runs${rest}`;
const queue = (body: object = experiment(), key?: string) => {
  const call = owner.post(runs(), { systemId, revision: 1, experiment: body });
  return key ? call.set('idempotency-key', key) : call;
};
const reach = (id: string, state: string) =>
  eventually(async () => {
    const { body } = await owner.get(runs(`/${id}`));
    return body.state === state && body;
  });
/** A run that takes long: a powder of many orientations, coupled. */
const slow = () => ({
  ...experiment(500, 512),
  sample: { kind: 'powder', orientations: 900_000 },
  lineWidth: 100,
});
const slowSystem = async () => {
  const nuclei = ['A', 'B', 'C', 'D', 'E'].map((id, i) => ({
    id,
    isotope: '1H',
    shift: i,
    position: [i * 2, i % 2, (i * i) % 3],
  }));
  const couplings = nuclei.flatMap((a, i) =>
    nuclei.slice(i + 1).map((b) => ({ between: [a.id, b.id], dipolar: 'positions' })),
  );
  const document = { format: 'heddle.spin-system/1', name: 'Slow', nuclei, couplings };
  return (await owner.post(`/labs/${harness.labId}/systems`, { document, shared: true })).body.id as string;
};

describe('the table of states', () => {
  it('knows no move out of a finished run', () => expect(NEXT.done).toEqual([]));
  it.each(RUN_STATES)('lists the states before %s as the table says', (state) => {
    expect(statesBefore(state)).toEqual(RUN_STATES.filter((before) => NEXT[before].includes(state)));
  });
});

describe('a run', () => {
  it('is computed on the pool and gives its spectrum in every form', async () => {
    const made = await queue();
    expect(made.status).toBe(201);
    const done = await reach(made.body.id, 'done');
    expect(done).toMatchObject({ progress: 1, error: null, system: { name: 'Pair' }, revision: 1 });
    const result = (await owner.get(runs(`/${done.id}/result`))).body;
    // The integral of the absorption is the number of observed nuclei (contract, "FID and spectrum").
    const { real } = result.spectrum;
    const integral = real.reduce((sum: number, y: number) => sum + y, 0) * (2000 / real.length);
    expect(integral).toBeCloseTo(2, 6);
    const jcamp = await owner
      .get(runs(`/${done.id}/result.jdx`))
      .buffer(true)
      .parse(asText);
    const [block] = convert(jcamp.body as string).flatten;
    expect(block.spectra[0].data.y).toHaveLength(real.length);
    expect((await owner.get(runs(`/${done.id}/result.csv`))).text.split('\r\n')).toHaveLength(real.length + 2);
    const bytes = (
      await owner
        .get(runs(`/${done.id}/arrays`))
        .buffer(true)
        .parse(asBytes)
    ).body as Buffer;
    const header = bytes.readUInt32LE(0);
    expect(JSON.parse(bytes.subarray(4, 4 + header).toString()).report.engine).toBe(done.engine);
    expect(bytes.readDoubleLE(4 + header + 8)).toBe(real[0]);
  });

  it('takes the documents inline, and keeps the system', async () => {
    const made = await owner.post(runs(), { system: system('Inline'), experiment: experiment() });
    expect(made.body.system.name).toBe('Inline');
    await reach(made.body.id, 'done');
    const none = await owner.post(runs(), { experiment: experiment() });
    expect(none.body.errors.map(({ path }: { path: string }) => path)).toEqual(['systemId', 'revision']);
  });

  it('is offered rather than computed again', async () => {
    const first = await queue(experiment(410));
    const second = await queue(experiment(410));
    expect(second.status).toBe(200);
    expect(second.body).toMatchObject({ id: first.body.id, identical: true });
  });

  it('is made once for one Idempotency-Key, whatever comes with it', async () => {
    const first = await queue(experiment(420), 'the same call');
    const again = await queue(experiment(421), 'the same call');
    expect(again.body.id).toBe(first.body.id);
  });

  it('is refused with the fields where the documents do not fit together', async () => {
    const reply = await queue({ ...experiment(), observe: '13C' });
    expect(reply.status).toBe(422);
    expect(reply.body.errors[0].path).toBe('observe');
  });

  it('can be cancelled while it is running, and queued again', async () => {
    const id = await slowSystem();
    const made = await owner.post(runs(), { systemId: id, revision: 1, experiment: slow() });
    await reach(made.body.id, 'running');
    expect((await owner.post(runs(`/${made.body.id}/cancel`))).body.state).toBe('cancelled');
    expect((await owner.post(runs(`/${made.body.id}/cancel`))).status).toBe(409);
    // The worker is free again: another run gets through.
    const next = await queue(experiment(430));
    await reach(next.body.id, 'done');
    expect((await owner.get(runs(`/${made.body.id}`))).body.state).toBe('cancelled');
    expect((await owner.post(runs(`/${made.body.id}/requeue`))).body.state).toBe('queued');
    await owner.post(runs(`/${made.body.id}/cancel`));
    expect((await owner.delete(runs(`/${made.body.id}`))).status).toBe(204);
  });

  it('is done at once when it is short, though a long one holds the worker', async () => {
    const long = await owner.post(runs(), { systemId: await slowSystem(), revision: 1, experiment: slow() });
    await reach(long.body.id, 'running');
    const short = await queue(experiment(470));
    await reach(short.body.id, 'done');
    expect((await owner.get(runs(`/${long.body.id}`))).body.state).toBe('running');
    await owner.post(runs(`/${long.body.id}/cancel`));
  });

  it('goes back into the queue when its worker is lost, and is computed then', async () => {
    const made = await queue(experiment(440));
    await reach(made.body.id, 'done');
    const repository = harness.app.get(DataSource).getRepository(RunEntity);
    const lost = {
      state: 'running' as const,
      lease: '00000000-0000-4000-8000-000000000000',
      leaseUntil: new Date(Date.now() - 1000),
    };
    await repository.update({ id: made.body.id }, { ...lost, attempts: 1 });
    expect(await reach(made.body.id, 'done')).toMatchObject({ state: 'done' });
    await repository.update({ id: made.body.id }, { ...lost, attempts: 3 });
    expect((await reach(made.body.id, 'failed')).error).toMatch(/lost 3 times/);
  });

  it('is steered by its owner or a leader only', async () => {
    const made = await queue(experiment(450));
    const colleague = await harness.member('colleague', 'instructor');
    expect((await colleague.get(runs(`/${made.body.id}`))).status).toBe(200);
    expect((await colleague.delete(runs(`/${made.body.id}`))).status).toBe(403);
  });
});

describe('a cost estimate', () => {
  it('tells method and seconds before the run', async () => {
    const reply = await owner.post(`/labs/${harness.labId}/estimate`, {
      system: system('Pair'),
      experiment: experiment(),
    });
    expect(reply.body).toMatchObject({ method: 'blocks', dimensions: { largestBlock: 2 } });
  });

  it('says which document and field is wrong', async () => {
    const reply = await owner.post(`/labs/${harness.labId}/estimate`, { system: {}, experiment: experiment() });
    expect(reply.status).toBe(422);
  });
});

it('tells what happens to runs over the event stream', async () => {
  const seen: string[] = [];
  const { port } = harness.app.getHttpServer().address() as AddressInfo;
  const headers = { cookie: `heddle_access=${owner.cookie('heddle_access')}` };
  const stream = get({ port, path: `/api/labs/${harness.labId}/events`, headers }, (response) => {
    response.on('data', (chunk: Buffer) => seen.push(chunk.toString()));
  });
  stream.on('error', () => undefined);
  await new Promise((resolve) => setTimeout(resolve, 300));
  const made = await queue(experiment(460));
  await reach(made.body.id, 'done');
  await eventually(() => Promise.resolve(seen.join('').includes('"state":"done"')));
  expect(seen.join('')).toContain(made.body.id);
  stream.destroy();
});
