import { startHarness, system, type Browser, type Harness } from './harness.js';

let harness: Harness;
let owner: Browser;
let colleague: Browser;
let leader: Browser;
beforeAll(async () => {
  harness = await startHarness();
  owner = await harness.member('owner', 'chemist');
  colleague = await harness.member('colleague', 'chemist');
  leader = await harness.member('lead', 'leader');
});
afterAll(() => harness.close());

const systems = (rest = '') => `/labs/${harness.labId}/systems${rest}`;
const make = async (name: string, shared = true) =>
  (await owner.post(systems(), { document: system(name), shared })).body as { id: string; version: number };

describe('systems', () => {
  it('are private to their owner until they are shared', async () => {
    const { id, version } = await make('Private one', false);
    expect((await colleague.get(systems(`/${id}`))).status).toBe(404);
    expect((await colleague.get(systems())).body.items.map((one: { id: string }) => one.id)).not.toContain(id);
    expect((await owner.patch(systems(`/${id}`), { version, shared: true })).status).toBe(200);
    expect((await colleague.get(systems(`/${id}`))).body.name).toBe('Private one');
    expect((await colleague.patch(systems(`/${id}`), { version: version + 1, shared: false })).status).toBe(403);
  });

  it('refuse a document with the path of every field', async () => {
    const document = {
      ...system('Broken'),
      nuclei: [
        { id: 'Ha', isotope: '1H', shift: 'x' },
        { id: 'Hb', isotope: '9Zz', shift: 1 },
      ],
    };
    const reply = await owner.post(systems(), { document });
    expect(reply.status).toBe(422);
    expect(reply.body.errors.map(({ path }: { path: string }) => path)).toEqual(
      expect.arrayContaining(['nuclei[0].shift', 'nuclei[1].isotope']),
    );
    expect(reply.body.errors[0].pointer).toBe('#/nuclei/0/shift');
  });

  it('are paged, sorted by a closed set of keys, and filtered', async () => {
    for (const name of ['Zeta', 'Alpha', 'Mu']) await make(name);
    const first = (await owner.get(systems('?sort=name&limit=2'))).body;
    expect(first.items).toHaveLength(2);
    const second = (await owner.get(systems(`?sort=name&limit=2&cursor=${first.nextCursor}`))).body;
    const names = [...first.items, ...second.items].map(({ name }: { name: string }) => name);
    expect(names).toEqual([...names].sort());
    expect((await owner.get(systems('?q=lph'))).body.items.map(({ name }: { name: string }) => name)).toEqual([
      'Alpha',
    ]);
    expect((await owner.get(systems('?nuclide=13C'))).body.items).toEqual([]);
    expect((await owner.get(systems('?sort=passwordHash'))).body.errors[0].path).toBe('sort');
    expect((await owner.get(systems('?limit=1000'))).status).toBe(422);
  });

  it('keep every revision; the second of two who save sees both versions', async () => {
    const { id } = await make('Contested');
    const saved = await owner.post(systems(`/${id}/revisions`), {
      basedOn: 1,
      document: system('Contested', 3.3),
      note: 'new shift',
    });
    expect(saved.body).toMatchObject({ number: 2, note: 'new shift', author: { name: 'owner' } });
    const lost = await leader.post(systems(`/${id}/revisions`), { basedOn: 1, document: system('Contested', 2.2) });
    expect(lost.status).toBe(409);
    expect(lost.body.current.document.nuclei[0].shift).toBe(3.3);
    expect(lost.body.yours.document.nuclei[0].shift).toBe(2.2);
    expect((await owner.get(systems(`/${id}/revisions/1`))).body.document.nuclei[0].shift).toBe(3);
    expect(
      (await owner.get(systems(`/${id}/revisions`))).body.items.map(({ number }: { number: number }) => number),
    ).toEqual([2, 1]);
    expect((await colleague.post(systems(`/${id}/revisions`), { basedOn: 2, document: system('X') })).status).toBe(403);
  });

  it('save one revision when two save at the same moment', async () => {
    const { id } = await make('Race');
    const replies = await Promise.all(
      [1, 2, 3, 4].map((shift) =>
        owner.post(systems(`/${id}/revisions`), { basedOn: 1, document: system('Race', shift) }),
      ),
    );
    expect(replies.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409]);
  });

  it('are copied, archived, given away and deleted', async () => {
    const { id, version } = await make('Original');
    expect((await colleague.post(systems(`/${id}/duplicate`))).body).toMatchObject({
      name: 'Copy of Original',
      shared: false,
    });
    await owner.patch(systems(`/${id}`), { version, archived: true });
    expect((await owner.get(systems('?archived=true'))).body.items.map((one: { id: string }) => one.id)).toContain(id);
    const members = (await owner.get(`/labs/${harness.labId}/members`)).body.items;
    const { userId } = members.find(({ name }: { name: string }) => name === 'colleague');
    const given = await owner.patch(systems(`/${id}`), { version: version + 1, ownerId: userId });
    expect(given.body.owner.name).toBe('colleague');
    expect((await owner.delete(systems(`/${id}`))).status).toBe(403);
    expect((await colleague.delete(systems(`/${id}`))).status).toBe(204);
  });
});

it('another lab reaches nothing, by any route that the OpenAPI document knows', async () => {
  const { id } = await make('Secret');
  const other = await harness.newLab('Elsewhere');
  const stranger = await harness.member('stranger', 'admin', other);
  const { paths } = (await owner.get('/docs-json')).body as { paths: Record<string, Record<string, unknown>> };
  const tried: [string, string, number][] = [];
  for (const [path, methods] of Object.entries(paths)) {
    if (!path.includes('{labId}') || path.endsWith('/events')) continue;
    for (const method of Object.keys(methods)) {
      for (const lab of [harness.labId, other]) {
        const filled = path
          .replace('/api', '')
          .replace('{labId}', lab)
          .replace(/\{(id|memberId)\}/, id)
          .replace('{number}', '1');
        if (lab === other && !path.includes('{id}')) continue;
        const call = { get: stranger.get(filled), delete: stranger.delete(filled) } as Record<string, unknown>;
        const reply = (await (method === 'get' || method === 'delete'
          ? call[method]
          : method === 'patch'
            ? stranger.patch(filled, {})
            : stranger.post(filled, {}))) as { status: number };
        // Of their own lab a body can be refused before the thing is looked for; nothing is ever found.
        const hidden = lab === harness.labId ? [403, 404] : [403, 404, 422];
        if (!hidden.includes(reply.status)) tried.push([method, filled, reply.status]);
      }
    }
  }
  expect(tried).toEqual([]);
});
