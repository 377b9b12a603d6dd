import request from 'supertest';
import { Browser, PASSWORD, startHarness, type Harness } from './harness.js';

let harness: Harness;
let admin: Browser;
let chemist: Browser;
beforeAll(async () => {
  harness = await startHarness();
  admin = await harness.member('boss', 'admin');
  chemist = await harness.member('chem', 'chemist');
});
afterAll(() => harness.close());

const lab = () => `/labs/${harness.labId}`;
const linkIn = (subject: RegExp) => {
  const mail = harness.mails().find((one) => subject.test(one.subject));
  return /\/(?:invitations|reset)\/([\w-]+)/.exec(mail?.text ?? '')?.[1] ?? '';
};

describe('invitations', () => {
  it('are mailed, seen without a session, accepted once', async () => {
    const invited = await admin.post(`${lab()}/invitations`, { email: 'New.Person@test.example', role: 'instructor' });
    expect(invited.status).toBe(201);
    const token = linkIn(/invites you/);
    const guest = new Browser(harness.app);
    expect((await guest.get(`/invitations/${token}`)).body).toEqual({
      labName: 'Test laboratory',
      email: 'new.person@test.example',
      role: 'instructor',
      needsAccount: true,
    });
    const lacking = await guest.postBare(`/invitations/${token}/accept`, {});
    expect(lacking.body.errors.map(({ path }: { path: string }) => path)).toEqual(['name', 'password']);
    const joined = await guest.postBare(`/invitations/${token}/accept`, { name: 'New Person', password: PASSWORD });
    expect(joined.body.memberships).toMatchObject([{ role: 'instructor' }]);
    expect((await guest.get('/auth/session')).status).toBe(200);
    expect((await guest.get(`/invitations/${token}`)).status).toBe(404);
  });

  it('are for admins', async () => {
    expect((await chemist.post(`${lab()}/invitations`, { email: 'x@test.example', role: 'admin' })).status).toBe(403);
    expect((await chemist.get(`${lab()}/invitations`)).status).toBe(403);
  });

  it('never put an account in another hand: somebody with one signs in first', async () => {
    await admin.post(`${lab()}/invitations`, { email: 'outside@test.example', role: 'leader' });
    const token = linkIn(/invites you/);
    const other = await harness.newLab('Another');
    const outside = await harness.member('outside', 'chemist', other);
    expect((await new Browser(harness.app).postBare(`/invitations/${token}/accept`, {})).status).toBe(401);
    const joined = await outside.post(`/invitations/${token}/accept`);
    expect(joined.body.memberships).toHaveLength(2);
  });
});

describe('members', () => {
  it('change roles by an admin, but the last admin stays', async () => {
    const { items } = (await admin.get(`${lab()}/members`)).body;
    const self = items.find(({ email }: { email: string }) => email === 'boss@test.example');
    const other = items.find(({ email }: { email: string }) => email === 'chem@test.example');
    expect((await admin.patch(`${lab()}/members/${other.id}`, { role: 'leader' })).body.role).toBe('leader');
    const refused = await admin.patch(`${lab()}/members/${self.id}`, { role: 'chemist' });
    expect([refused.status, refused.body.type]).toEqual([409, '/problems/last-admin']);
    expect((await chemist.patch(`${lab()}/members/${self.id}`, { role: 'chemist' })).status).toBe(403);
  });

  it('lose their sessions and tokens when they are removed', async () => {
    const leaving = await harness.member('leaving', 'chemist');
    const { secret } = (await leaving.post('/account/tokens', { name: 'script' })).body;
    const bearer = () =>
      request(harness.app.getHttpServer()).get('/api/auth/session').set('authorization', `Bearer ${secret}`);
    expect((await bearer()).status).toBe(200);
    const { items } = (await admin.get(`${lab()}/members`)).body;
    const { id } = items.find(({ email }: { email: string }) => email === 'leaving@test.example');
    expect((await admin.delete(`${lab()}/members/${id}`)).status).toBe(204);
    expect((await leaving.get('/auth/session')).status).toBe(401);
    expect((await bearer()).status).toBe(401);
  });
});

describe('accounts', () => {
  it('show a token once and keep only its hash', async () => {
    const made = (await chemist.post('/account/tokens', { name: 'plot script' })).body;
    expect(made.secret).toMatch(/^hdl_/);
    const { items } = (await chemist.get('/account/tokens')).body;
    expect(items[0]).toMatchObject({ name: 'plot script' });
    expect(JSON.stringify(items)).not.toContain(made.secret);
    const rows = await harness.app.get((await import('typeorm')).DataSource).query('SELECT * FROM personal_tokens');
    expect(JSON.stringify(rows)).not.toContain(made.secret);
    expect((await chemist.delete(`/account/tokens/${made.id}`)).status).toBe(204);
  });

  it('take a new password from a mailed link, once, and end all sessions', async () => {
    const reset = await harness.member('forgetful', 'chemist');
    expect(
      (await new Browser(harness.app).postBare('/auth/password-reset', { email: 'forgetful@test.example' })).status,
    ).toBe(204);
    const token = linkIn(/new password/);
    const weak = await new Browser(harness.app).postBare('/auth/password-reset/confirm', { token, password: 'short' });
    expect(weak.body.errors[0].path).toBe('password');
    const password = 'a longer one than before';
    const confirm = () => new Browser(harness.app).postBare('/auth/password-reset/confirm', { token, password });
    expect((await confirm()).status).toBe(204);
    expect((await confirm()).status).toBe(422);
    expect((await reset.get('/auth/session')).status).toBe(401);
  });

  it('rename a lab with its version; a lost race carries both', async () => {
    const { version } = (await admin.get(lab())).body;
    expect((await admin.patch(lab(), { name: 'Renamed', version })).body.name).toBe('Renamed');
    const lost = await admin.patch(lab(), { name: 'Too late', version });
    expect(lost.status).toBe(409);
    expect(lost.body).toMatchObject({ current: { name: 'Renamed' }, yours: { name: 'Too late' } });
  });
});
