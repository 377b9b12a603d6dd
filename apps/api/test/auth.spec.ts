import request from 'supertest';
import { DataSource } from 'typeorm';
import { Browser, PASSWORD, startHarness, type Harness } from './harness.js';

let harness: Harness;
let browsers: Record<'csrf' | 'rotating' | 'everywhere', Browser>;
beforeAll(async () => {
  harness = await startHarness();
  await harness.member('ada', 'chemist');
  // Before the throttle closes: all of this file comes from one address.
  browsers = {
    csrf: await harness.member('csrf', 'chemist'),
    rotating: await harness.member('rotating', 'chemist'),
    everywhere: await harness.member('everywhere', 'chemist'),
  };
});
afterAll(() => harness.close());

const fresh = () => new Browser(harness.app);

describe('signing in', () => {
  it('gives a session with the labs, in cookies that scripts can not read', async () => {
    const reply = await fresh().postBare('/auth/sign-in', { email: 'ada@test.example', password: PASSWORD });
    expect(reply.status).toBe(200);
    expect(reply.body.memberships).toEqual([{ labId: harness.labId, labName: 'Test laboratory', role: 'chemist' }]);
    const cookies = (reply.headers['set-cookie'] as unknown as string[]).map((cookie) => cookie.toLowerCase());
    for (const name of ['heddle_access', 'heddle_refresh']) {
      const cookie = cookies.find((text) => text.startsWith(name))!;
      expect(cookie).toContain('httponly');
      expect(cookie).toContain('samesite=strict');
    }
    expect(JSON.stringify(reply.body)).not.toContain('heddle_');
  });

  it('tells an unknown address and a wrong password apart by nothing', async () => {
    const wrong = await fresh().postBare('/auth/sign-in', {
      email: 'ada@test.example',
      password: 'not this one at all',
    });
    const unknown = await fresh().postBare('/auth/sign-in', {
      email: 'nobody@test.example',
      password: 'not this one at all',
    });
    expect([wrong.status, wrong.body.detail]).toEqual([unknown.status, unknown.body.detail]);
    expect(wrong.status).toBe(401);
    expect(wrong.headers['content-type']).toContain('application/problem+json');
  });

  it('refuses fields that are unknown or of the wrong kind, each by its path', async () => {
    const reply = await fresh().postBare('/auth/sign-in', { email: 'no address', password: 'x', more: 1 });
    expect(reply.status).toBe(422);
    expect(reply.body.errors.map(({ path }: { path: string }) => path).sort()).toEqual(['email', 'more']);
  });

  it('is throttled', async () => {
    const replies = [];
    for (let i = 0; i < 12; i++)
      replies.push(await fresh().postBare('/auth/sign-in', { email: 'q@test.example', password: 'x' }));
    expect(replies.at(-1)!.status).toBe(429);
  });
});

describe('a session', () => {
  it('needs the CSRF header for what changes something', async () => {
    const ada = browsers.csrf;
    expect((await ada.postBare('/account/tokens', { name: 'x' })).status).toBe(403);
    expect((await ada.post('/account/tokens', { name: 'x' })).status).toBe(201);
  });

  it('rotates its refresh token, and ends when an old one is used again later', async () => {
    const browser = browsers.rotating;
    const old = browser.cookie('heddle_refresh', '/api/auth');
    expect((await browser.post('/auth/refresh')).status).toBe(200);
    expect(browser.cookie('heddle_refresh', '/api/auth')).not.toBe(old);
    expect((await browser.get('/auth/session')).status).toBe(200);
    // Somebody comes with the old token after the moment that two tabs of one browser may need.
    await harness.app.get(DataSource).query('UPDATE sessions SET rotatedAt = ?', [new Date(Date.now() - 60_000)]);
    const thief = await request(harness.app.getHttpServer())
      .post('/api/auth/refresh')
      .set('cookie', `heddle_refresh=${old}; heddle_csrf=x`)
      .set('x-csrf-token', 'x');
    expect(thief.status).toBe(401);
    expect((await browser.get('/auth/session')).status).toBe(401);
  });

  it('ends everywhere at once', async () => {
    const one = browsers.everywhere;
    expect((await one.get('/account/sessions')).body.items).toHaveLength(1);
    expect((await one.post('/auth/sign-out-everywhere')).status).toBe(204);
    expect((await one.get('/auth/session')).status).toBe(401);
  });

  it('is asked for everywhere but on open routes', async () => {
    expect((await fresh().get('/auth/session')).status).toBe(401);
    expect((await fresh().get(`/labs/${harness.labId}/systems`)).status).toBe(401);
    expect((await fresh().get('/nuclides')).status).toBe(200);
    expect((await fresh().get('/health')).status).toBe(200);
  });
});
