import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { AxeBuilder } from '@axe-core/playwright';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** The built server on the database of the environment, with its demonstration lab, and a browser to use it. */
export interface Stage {
  readonly address: string;
  /** A page of its own, signed in as the demonstration lab's member with this role. */
  signIn(role: string, width?: number): Promise<Page>;
  close(): Promise<void>;
}

const FLAGS = ['--no-sandbox', '--disable-gpu', '--no-first-run', '--disable-background-networking', '--disable-sync'];

export async function setStage(): Promise<Stage> {
  const data = mkdtempSync(join(tmpdir(), 'heddle-e2e-'));
  const port = await freePort();
  const address = `http://127.0.0.1:${port}`;
  const server = spawn(process.execPath, ['apps/api/dist/main.js'], {
    cwd: root,
    env: { ...process.env, HEDDLE_DATA: data, HEDDLE_PORT: String(port), HEDDLE_URL: address, NODE_OPTIONS: '' },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  await answering(address, server);
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: FLAGS });
  const contexts: BrowserContext[] = [];
  return {
    address,
    signIn: async (role, width = 1280) => {
      const context = await browser.newContext({ viewport: { width, height: 900 }, acceptDownloads: true });
      contexts.push(context);
      const page = await context.newPage();
      await enter(page, address, role, data);
      return page;
    },
    close: () => strike(browser, server, data),
  };
}

async function enter(page: Page, address: string, role: string, data: string): Promise<void> {
  const accounts = readFileSync(join(data, 'demo-accounts'), 'utf8').trim().split('\n');
  const [email, password] = accounts.find((line) => line.startsWith(`${role}@`))!.split(/\s+/);
  await page.goto(`${address}/sign-in`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByRole('textbox', { name: 'Password' }).fill(password);
  await page.keyboard.press('Enter');
  await page.waitForURL('**/today');
}

async function strike(browser: Browser, server: ChildProcess, data: string): Promise<void> {
  await browser.close();
  const ended = new Promise((resolve) => server.once('exit', resolve));
  server.kill('SIGTERM');
  await ended;
  rmSync(data, { recursive: true, force: true });
}

/** What axe finds wrong on the page by WCAG 2.2 AA, in a line each. */
export async function axeFindings(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
    .analyze();
  return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(' | ')}`);
}

async function freePort(): Promise<number> {
  const probe = createServer();
  await new Promise<void>((resolve) => probe.listen(0, '127.0.0.1', resolve));
  const { port } = probe.address() as { port: number };
  await new Promise((resolve) => probe.close(resolve));
  return port;
}

async function answering(address: string, server: ChildProcess): Promise<void> {
  for (let tries = 0; tries < 300; tries++) {
    if (server.exitCode !== null) throw new Error(`the server ended with ${server.exitCode}`);
    const reply = await fetch(`${address}/api/health`).catch(() => null);
    if (reply?.ok) return;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  throw new Error('the server does not answer');
}
