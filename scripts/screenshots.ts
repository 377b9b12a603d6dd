/**
 * Pictures of the screens for the README and for looking at: a server of its own on the database that DATABASE_URL names
 * (use an empty one), the demonstration lab, Debian's chromium.
 *   DATABASE_URL=... node --import tsx scripts/screenshots.ts FOLDER
 */
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { setStage } from './e2e/stage.js';

const [folder] = process.argv.slice(2);
if (!folder) throw new Error('Name the folder for the pictures.');
mkdirSync(folder, { recursive: true });

const stage = await setStage();
for (const width of [1440, 1024, 390]) {
  const page = await stage.signIn('leader', width);
  const lab = page.url().replace(/\/today$/, '');
  for (const scheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme: scheme, reducedMotion: 'reduce' });
    const shoot = (name: string) =>
      page.screenshot({ path: join(folder, `${name}-${scheme}-${width}.png`), fullPage: true });
    for (const path of ['today', 'systems', 'runs', 'series', 'members', 'systems/new']) {
      await page.goto(`${lab}/${path}`);
      await page.waitForLoadState('networkidle');
      await shoot(path.replace('/', '-'));
    }
    await page.goto(`${lab}/systems?q=Marrow`);
    await page
      .getByRole('link', { name: /Marrow/ })
      .first()
      .click();
    await page.getByRole('application', { name: /Live/ }).waitFor();
    await shoot('system');
    await page.goto(`${lab}/runs?state=done`);
    await page
      .getByRole('link', { name: /Marrow/ })
      .first()
      .click();
    await page.getByRole('application', { name: /spectrum of/ }).waitFor();
    await shoot('run');
    await page.goto(`${lab}/series`);
    await page.getByRole('link', { name: /Coalescence/ }).click();
    await page.getByRole('application', { name: /of the series/ }).waitFor();
    await shoot('series-one');
  }
}
await stage.close();
