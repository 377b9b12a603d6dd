import { Test } from '@nestjs/testing';
import type { NestExpressApplication } from '@nestjs/platform-express';
import request from 'supertest';
import { DataSource } from 'typeorm';
import { AccountService } from '../src/account/account.service.js';
import { AppModule } from '../src/app.module.js';
import { configure } from '../src/configure.js';
import { LabsService } from '../src/labs/labs.service.js';
import { MailCatcher } from '../src/mail/mail-catcher.js';
import { MembersService } from '../src/members/members.service.js';
import type { Role } from '../src/policy/policy.js';

export const PASSWORD = 'warp weft shuttle reed';

/** A signed-in browser: keeps its cookies and sends the CSRF header with every call. */
export class Browser {
  private readonly agent;

  constructor(app: NestExpressApplication) {
    this.agent = request.agent(app.getHttpServer());
  }

  cookie(name: string, path = '/'): string {
    const access = { path, domain: '127.0.0.1', secure: false, script: false };
    return this.agent.jar.getCookie(name, access)?.value ?? '';
  }

  get(path: string) {
    return this.agent.get(`/api${path}`);
  }
  post(path: string, body: object = {}) {
    return this.agent.post(`/api${path}`).set('x-csrf-token', this.cookie('heddle_csrf')).send(body);
  }
  patch(path: string, body: object) {
    return this.agent.patch(`/api${path}`).set('x-csrf-token', this.cookie('heddle_csrf')).send(body);
  }
  delete(path: string) {
    return this.agent.delete(`/api${path}`).set('x-csrf-token', this.cookie('heddle_csrf'));
  }
  /** A call without the header. */
  postBare(path: string, body: object = {}) {
    return this.agent.post(`/api${path}`).send(body);
  }

  async signIn(email: string, password = PASSWORD): Promise<this> {
    const reply = await this.postBare('/auth/sign-in', { email, password });
    if (reply.status !== 200) throw new Error(`sign-in of ${email}: ${reply.status} ${reply.text}`);
    return this;
  }
}

export interface Harness {
  app: NestExpressApplication;
  /** An account in the lab with this role, signed in. Its address is `${name}@test.example`. */
  member(name: string, role: Role, labId?: string): Promise<Browser>;
  newLab(name: string): Promise<string>;
  labId: string;
  mails(): ReturnType<MailCatcher['list']>;
  close(): Promise<void>;
}

/** The whole server on an empty database, without the demonstration lab. */
export async function startHarness(): Promise<Harness> {
  process.env.HEDDLE_DEMO = 'no';
  process.env.HEDDLE_WORKERS = '1';
  const module = await Test.createTestingModule({ imports: [AppModule] }).compile();
  const app = module.createNestApplication<NestExpressApplication>({ logger: ['error'] });
  await emptyTables(app.get(DataSource));
  configure(app);
  await app.listen(0, '127.0.0.1');
  const newLab = async (name: string) => (await app.get(LabsService).create(name)).id;
  const labId = await newLab('Test laboratory');
  return {
    app,
    labId,
    newLab,
    member: async (name, role, lab = labId) => {
      const email = `${name}@test.example`;
      const user = await app.get(AccountService).create(name, email, PASSWORD);
      await app.get(MembersService).add(lab, user.id, role);
      return new Browser(app).signIn(email);
    },
    mails: () => app.get(MailCatcher).list(),
    close: () => app.close(),
  };
}

async function emptyTables(dataSource: DataSource): Promise<void> {
  await dataSource.query('SET FOREIGN_KEY_CHECKS = 0');
  for (const { tableName } of dataSource.entityMetadatas) await dataSource.query(`DELETE FROM \`${tableName}\``);
  await dataSource.query('SET FOREIGN_KEY_CHECKS = 1');
}

/** Waits until `check` gives something. */
export async function eventually<T>(check: () => Promise<T | undefined | false>, seconds = 20): Promise<T> {
  const end = Date.now() + seconds * 1000;
  for (;;) {
    const found = await check();
    if (found) return found;
    if (Date.now() > end) throw new Error('it did not happen in time');
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

export const system = (name: string, shift = 3) => ({
  format: 'heddle.spin-system/1',
  name,
  nuclei: [
    { id: 'Ha', isotope: '1H', shift },
    { id: 'Hb', isotope: '1H', shift: 4.1 },
  ],
  couplings: [{ between: ['Ha', 'Hb'], j: 8 }],
});

export const experiment = (protonMHz = 400, points = 1024) => ({
  format: 'heddle.experiment/1',
  protonMHz,
  observe: '1H',
  acquisition: { centre: 3.5, width: 2000, points },
});

type Done = (error: Error | null, body: unknown) => void;

/** For supertest's `parse`: the body as text, and as bytes. */
export function asText(response: unknown, done: Done): void {
  asBytes(response, (error, body) => done(error, (body as Buffer).toString()));
}

export function asBytes(response: unknown, done: Done): void {
  const stream = response as NodeJS.ReadableStream;
  const chunks: Buffer[] = [];
  stream.on('data', (chunk: Buffer) => chunks.push(chunk));
  stream.on('end', () => done(null, Buffer.concat(chunks)));
}
