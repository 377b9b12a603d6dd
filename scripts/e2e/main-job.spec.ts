import { readFileSync } from 'node:fs';
import { convert } from 'jcampconverter';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { axeFindings, setStage, type Stage } from './stage.js';

let stage: Stage;
beforeAll(async () => {
  stage = await setStage();
});
afterAll(() => stage.close());

/** A person types no faster than the focus moves. */
const cellHasFocus = (page: Page) => page.locator('[role=gridcell]:focus').waitFor();

/** Types a table's cells from the one that has the focus on: Tab goes on, Enter ends a row. */
async function typeRows(page: Page, table: string, rows: string[][]): Promise<void> {
  const grid = page.getByRole('grid', { name: table, exact: true });
  for (const [r, row] of rows.entries()) {
    await grid.locator('tbody tr').nth(r).getByRole('gridcell').first().click();
    for (const [c, text] of row.entries()) {
      await page.keyboard.type(text);
      await page.keyboard.press(c === row.length - 1 ? 'Enter' : 'Tab');
      await cellHasFocus(page);
    }
  }
}

const shownSpectrum = (page: Page) => page.getByRole('application', { name: /Live 1H spectrum/ });

describe('the main job', () => {
  it('goes from sign-in over a typed system to an exported spectrum', async () => {
    const page = await stage.signIn('chemist');
    await page.getByRole('link', { name: 'Systems' }).click();
    await page.getByRole('link', { name: 'New system' }).first().click();
    await page.getByLabel('Name of the system').fill('Typed in a test');
    await typeRows(page, 'Nuclei', [
      ['Ha', '1H', '1', '5.8'],
      ['Hb', '1H', '1', '5.2'],
      ['Hc', '1H', '1', '5.1'],
      ['Hd', '1H', '3', '1.7'],
    ]);
    await typeRows(page, 'Couplings', [
      ['Ha', 'Hb', '17'],
      ['Ha', 'Hc', '10'],
      ['Ha', 'Hd', '6.5'],
    ]);
    await shownSpectrum(page).waitFor();
    await page.getByRole('button', { name: 'Save and run' }).click();
    await page.waitForURL('**/runs/*');
    await page.getByRole('application', { name: /1H spectrum of Typed in a test/ }).waitFor({ timeout: 60_000 });

    const [file] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'JCAMP-DX' }).click(),
    ]);
    const [block] = convert(readFileSync(await file.path(), 'utf8')).flatten;
    const { x, y } = block.spectra[0].data as { x: number[]; y: number[] };
    const window = (x[0] - x[x.length - 1]) * 400;
    const integral = (y.reduce((sum, value) => sum + value, 0) * window) / (y.length - 1);
    // Six protons were typed; the integral of the absorption counts them.
    expect(integral).toBeCloseTo(6, 1);
  });

  it('keeps what was typed over a reload, and shows an error at its cell', async () => {
    const page = await stage.signIn('instructor');
    await page.getByRole('link', { name: 'Systems' }).click();
    await page.getByRole('link', { name: 'New system' }).first().click();
    await typeRows(page, 'Nuclei', [['Ha', '1H', '1', '7,2']]);
    const cell = page.getByRole('gridcell', { name: /Shift.*Ha/ });
    expect(await cell.getAttribute('aria-invalid')).toBe('true');
    await page.reload();
    await page.getByRole('gridcell', { name: /Shift.*Ha: 7,2/ }).waitFor();
    expect(await page.getByRole('button', { name: 'Save system' }).isDisabled()).toBe(true);
  });

  it('can be done with the keyboard alone', async () => {
    const page = await stage.signIn('leader');
    await page.getByRole('heading', { level: 1, name: 'Today' }).waitFor();
    await page.keyboard.press('Alt+n');
    await page.waitForURL('**/systems/new');
    await page.getByLabel('Name of the system').focus();
    await page.keyboard.type('By keys');
    const first = page.getByRole('grid', { name: 'Nuclei', exact: true }).getByRole('gridcell').first();
    await first.focus();
    await page.keyboard.type('Ha');
    for (const key of ['Tab', 'ArrowRight', 'ArrowRight']) {
      await page.keyboard.press(key);
      await cellHasFocus(page);
    }
    await page.keyboard.type('3');
    await page.keyboard.press('Enter');
    await page.keyboard.press('Control+s');
    await page.waitForURL(/systems\/[0-9a-f-]{36}/);
    await page.getByText('Revision 1 of 1').waitFor();
    await shownSpectrum(page).waitFor();
    await page.keyboard.press('Control+Enter');
    await page.waitForURL('**/runs/*');
    await page.getByRole('application', { name: /spectrum of By keys/ }).waitFor({ timeout: 60_000 });
  });

  it('shows the second of two who save both versions, and loses nothing', async () => {
    const [one, two] = [await stage.signIn('chemist'), await stage.signIn('leader')];
    await one.goto(`${one.url().replace(/today$/, 'systems')}?q=Larch`);
    await one.getByRole('link', { name: /Larch/ }).first().click();
    await one.waitForURL(/systems\/[0-9a-f-]{36}/);
    await two.goto(one.url());
    const edit = async (page: Page, text: string) => {
      const cell = page.getByRole('gridcell', { name: /Shift.*H1/ });
      await cell.focus();
      await page.keyboard.type(text);
      await page.keyboard.press('Enter');
      await page.keyboard.press('Control+s');
    };
    await edit(one, '4.11');
    await one.getByText('Revision 2 of 2').waitFor();
    await edit(two, '4.22');
    await two.getByRole('dialog').waitFor();
    await two.getByRole('radio', { name: '4.22' }).waitFor();
    await two.getByRole('radio', { name: '4.11' }).waitFor();
    await two.getByRole('button', { name: 'Save as revision 3' }).click();
    await two.getByText('Revision 3 of 3').waitFor();
    await two.getByRole('gridcell', { name: /Shift.*H1: 4.22/ }).waitFor();
  });
});

describe('solids and series', () => {
  it('go from a geometry file to a dipolar powder pattern', async () => {
    const page = await stage.signIn('chemist');
    await page.goto(page.url().replace(/today$/, 'systems/new'));
    await page.getByLabel('Name of the system').fill('From a file');
    await page.getByRole('tab', { name: 'Positions' }).click();
    await page.getByRole('button', { name: /Geometry file/ }).click();
    const text = page.getByLabel('Text of the file');
    await text.fill('2\npair\nH 0 0 0\nH 0 zero 1.58\n');
    await page.getByText(/^line 4/).waitFor();
    await text.fill('2\npair\nH 0 0 0\nH 0 0 1.58\n');
    await page.getByRole('cell', { name: '1.580' }).waitFor();
    expect(await axeFindings(page)).toEqual([]);
    await page.getByRole('button', { name: 'Use these 2 nuclei and 1 couplings' }).click();
    await page.getByLabel('Sample').selectOption('powder');
    await page.getByLabel('Line width, Hz').fill('2000');
    await page.getByLabel('Width, Hz', { exact: true }).fill('200000');
    await page.getByLabel('Points').fill('1024');
    await page.getByRole('button', { name: 'Save and run' }).click();
    await page.waitForURL('**/runs/*');
    await page.getByRole('application', { name: /spectrum of From a file/ }).waitFor({ timeout: 60_000 });
    await page.getByText('Orientations', { exact: false }).first().waitFor();
  });

  it('run along a quantity and are shown as a stack and as a map', async () => {
    const page = await stage.signIn('instructor');
    await page.goto(`${page.url().replace(/today$/, 'systems')}?q=Rowan`);
    await page.getByRole('link', { name: /Rowan/ }).first().click();
    await shownSpectrum(page).waitFor();
    await page.getByRole('button', { name: 'Series' }).click();
    await page.getByLabel(/^Values/).fill('10 100 1000');
    await page.getByRole('button', { name: 'Queue the series' }).click();
    await page.waitForURL('**/series/*');
    await page.getByRole('application', { name: /3 spectra of the series/ }).waitFor({ timeout: 60_000 });
    expect(await axeFindings(page)).toEqual([]);
    await page.getByText('Map', { exact: true }).click();
    await page.getByRole('img', { name: /Map of 3 spectra/ }).waitFor();
  });
});

/** How many pixels a page is wider than its window. */
const SIDEWAYS = 'document.documentElement.scrollWidth - document.documentElement.clientWidth';

describe('every page', () => {
  const PAGES = ['today', 'systems', 'runs', 'series', 'members', 'systems/new'];

  it('passes axe by WCAG 2.2 AA, in light and dark', async () => {
    const page = await stage.signIn('admin');
    const lab = page.url().replace(/\/today$/, '');
    const addresses = [...PAGES.map((path) => `${lab}/${path}`), `${stage.address}/account`];
    for (const scheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme: scheme, reducedMotion: 'reduce' });
      for (const address of addresses) {
        await page.goto(address);
        await page.getByRole('heading', { level: 1 }).or(page.getByLabel('Name of the system')).first().waitFor();
        expect({ scheme, address, findings: await axeFindings(page) }).toEqual({ scheme, address, findings: [] });
      }
    }
  });

  it('passes axe where a run and a system are open', async () => {
    const page = await stage.signIn('leader');
    await page.goto(`${page.url().replace(/today$/, 'runs')}?state=done`);
    await page
      .getByRole('link', { name: /Marrow/ })
      .first()
      .click();
    await page.getByRole('application', { name: /spectrum of Marrow/ }).waitFor();
    expect(await axeFindings(page)).toEqual([]);
    for (const tab of ['Processing', 'Peaks', 'Integrals', 'Lines', 'Documents']) {
      await page.getByRole('tab', { name: tab }).click();
      expect({ tab, findings: await axeFindings(page) }).toEqual({ tab, findings: [] });
    }
    await page.getByRole('heading', { level: 1 }).getByRole('link').click();
    await shownSpectrum(page).waitFor();
    expect(await axeFindings(page)).toEqual([]);
  });

  it('fits 390 px without scrolling sideways', async () => {
    const page = await stage.signIn('admin', 390);
    const lab = page.url().replace(/\/today$/, '');
    for (const path of PAGES) {
      await page.goto(`${lab}/${path}`);
      await page.waitForLoadState('networkidle').catch(() => undefined);
      const over = await page.evaluate<number>(SIDEWAYS);
      expect({ path, over }).toEqual({ path, over: 0 });
    }
  });
});
