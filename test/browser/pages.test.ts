import { readFileSync } from 'node:fs';
import type { AxeResults } from 'axe-core';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { clackwatch, fileIn, logText, newFolder, type Served, serve, testRam } from '../serve';
import { launch } from './launch';

const axeSource = readFileSync('node_modules/axe-core/axe.min.js', 'utf8');
let browser: Browser;
let valley: Served;
let own: Served;
const folder = newFolder();

beforeAll(async () => {
  browser = await launch();
  const made = clackwatch('demo', '--data', folder);
  expect(made.status, made.err).toBe(0);
  valley = await serve('--data', folder);
  own = await serve('--data', newFolder());
});
afterAll(async () => {
  await browser?.close();
  await valley?.stop();
  await own?.stop();
});

/** Opens a page and fails on any error that it logs. */
async function open(address: string, width: number): Promise<{ page: Page; errors: string[] }> {
  const page = await browser.newPage({ viewport: { width, height: 800 } });
  const errors: string[] = [];
  page.on('pageerror', (error) => errors.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text());
  });
  await page.goto(address);
  await page.waitForSelector('h1');
  await page.waitForFunction(() => document.querySelector('.waiting') === null);
  return { page, errors };
}

async function seriousTroubles(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  const { violations } = (await page.evaluate('axe.run()')) as AxeResults;
  return violations
    .filter((one) => one.impact === 'serious' || one.impact === 'critical')
    .map((one) => `${one.id}: ${one.nodes[0]?.html}`);
}

test.each([360, 1440])(
  'every page at %d px: no error, nothing serious for axe, nothing wider than the window',
  async (width) => {
    for (const hash of [
      '',
      'ram/marrowfen',
      'ram/hathrill',
      'load',
      'load/oskerrin',
      'receipt/1',
      'new',
      'visit/drumskel',
      'nowhere',
    ]) {
      const { page, errors } = await open(`${valley.address}/#/${hash}`, width);
      if (hash.startsWith('ram/'))
        await page.waitForFunction(
          () =>
            document.querySelectorAll('.chart canvas').length === 4 &&
            (document.querySelector('.chart canvas') as HTMLCanvasElement).width > 300,
        );
      expect(await seriousTroubles(page), hash).toEqual([]);
      expect(
        await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth),
        hash,
      ).toBeLessThanOrEqual(0);
      expect(errors, hash).toEqual([]);
      await page.close();
    }
  },
);

test('the rounds put the ram that needs a visit first on top, and can be narrowed', async () => {
  const { page } = await open(`${valley.address}/`, 1440);
  const names = await page.locator('.round h2').allTextContents();
  expect(names).toHaveLength(8);
  expect(['Marrowfen', 'Pellandry', 'Drumskel']).toContain(names[0]);
  expect(names.slice(-2).every((name) => !['Marrowfen', 'Pellandry', 'Drumskel', 'Oskerrin'].includes(name))).toBe(
    true,
  );
  await page.getByRole('button', { name: /^slipping/ }).click();
  expect(await page.locator('.round h2').allTextContents()).toEqual(['Oskerrin']);
  await page.close();
});

test('a ram shows its long-section, its figures with footing, its finding with checks and cautions, by keyboard alone', async () => {
  const { page } = await open(`${valley.address}/`, 1440);
  await page.getByRole('link', { name: 'Drumskel' }).focus();
  await page.keyboard.press('Enter');
  await page.waitForSelector('.section svg.wide');
  const drawing = page.locator('.section svg.wide');
  expect(await drawing.getAttribute('aria-label')).toMatch(/Long-section of Drumskel: a fall of/);
  expect(await drawing.textContent()).toMatch(/fall .* m.*lift .* m/s);
  const finding = page.locator('.finding.open');
  expect(await finding.textContent()).toMatch(/leak in the delivery pipe/);
  expect(await finding.textContent()).toMatch(/Close the drive-pipe valve slowly/);
  const figures = await page.locator('table.figures').textContent();
  expect(figures).toMatch(/Delivery.*L\/day.*±.*metered/s);
  expect(figures).toMatch(/Efficiency, Rankine/);
  await page.getByRole('button', { name: 'as a table' }).click();
  expect(await page.locator('.scroll.tall tbody tr').count()).toBeGreaterThan(100);
  await page.getByRole('button', { name: 'last 3 months' }).click();
  await page.waitForFunction(() => document.querySelectorAll('.scroll.tall tbody tr').length < 100);
  await page.close();
});

test('the whole job on the page: add a ram, drop a file, see how it is read, store it, enter a visit', async () => {
  const { page, errors } = await open(`${own.address}/#/new`, 360);
  await page.getByLabel('Name', { exact: true }).fill('Mill Lade');
  await page.getByLabel('Time zone').fill('Etc/GMT-3');
  await page.getByLabel('Fall, m', { exact: true }).fill('32');
  await page.getByLabel('Lift, m', { exact: true }).fill('28');
  await page.getByLabel('Drive pipe, length m').fill('18');
  await page.getByLabel('Drive pipe, bore mm').fill('50');
  await page.getByRole('button', { name: 'Add this ram' }).click();
  await expect.poll(() => page.locator('[role=alert]').textContent()).toMatch(/fall \(32 m\) is not below the lift/);
  await page.getByLabel('Fall, m', { exact: true }).fill('3,2');
  await page.getByLabel('Shape').selectOption('upright cylinder');
  await page.getByLabel('Diameter, m').fill('2.5');
  await page.getByLabel('Height, m').fill('2.2');
  await page.getByLabel('tank level').check();
  await page.getByRole('button', { name: 'Add this ram' }).click();
  await page.waitForURL(/#\/ram\/mill-lade/);

  await page.goto(`${own.address}/#/load/mill-lade`);
  await page.waitForSelector('#files', { state: 'attached' });
  const place = newFolder();
  await page.setInputFiles('#files', [fileIn(place, 'march.csv', logText(12)), fileIn(place, 'empty.csv', '')]);
  await expect.poll(() => page.locator('.refused').textContent()).toMatch(/empty\.csv/);
  const card = page.locator('.file', { hasText: 'march.csv' });
  await card.locator('table.reading').waitFor();
  expect(await card.locator('tr.words').first().textContent()).toContain('2026-03-01 00:00');
  expect(await card.locator('tr.understood').first().textContent()).toContain('2026-02-28 21:00');
  // a wrong meaning is put right, and the preview follows
  await card.getByLabel('What Chamber pressure (kPa) measures').selectOption('');
  await expect.poll(() => card.getByLabel('What Chamber pressure (kPa) measures').inputValue()).toBe('');
  expect(await seriousTroubles(page)).toEqual([]);
  await card.getByRole('button', { name: 'Store this file' }).click();
  await card.locator('.receipt').waitFor({ timeout: 20_000 });
  expect(await card.locator('.receipt').textContent()).toMatch(/new records stored/);

  await page.goto(`${own.address}/#/visit/mill-lade`);
  await page.getByLabel("When, by the ram's clock").fill('2026-03-05T10:00');
  await page.getByRole('group', { name: 'Bucket test of the delivery' }).getByLabel('Litres').fill('10');
  await page.getByRole('group', { name: 'Bucket test of the delivery' }).getByLabel('First filling, s').fill('83,5');
  await expect.poll(() => page.getByText('0.120 L/s').count()).toBe(1);
  await page.getByRole('button', { name: 'Keep this visit' }).click();
  await page.waitForURL(/#\/ram\/mill-lade/);
  await expect.poll(() => page.locator('.visits').textContent()).toMatch(/delivery 0\.120 L\/s/);
  expect(errors.filter((error) => !/status of 4/.test(error))).toEqual([]);
  await page.close();
});

test('what is printed has the drawing and the findings, and no buttons', async () => {
  const { page } = await open(`${valley.address}/#/ram/marrowfen`, 1440);
  await page.emulateMedia({ media: 'print' });
  expect(await page.locator('.section svg.wide').isVisible()).toBe(true);
  expect(await page.locator('.finding.open').first().isVisible()).toBe(true);
  for (const hidden of ['.masthead nav', '.actions', '.filter'])
    expect(await page.locator(hidden).first().isVisible()).toBe(false);
  await page.close();
});

test('an installation with its name in another script has a page of its own', async () => {
  const added = await fetch(`${own.address}/api/rams`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', 'x-clackwatch': '1' },
    body: JSON.stringify({ ...testRam, name: 'पुरानो घट्ट' }),
  });
  expect(added.status).toBe(201);
  const { page } = await open(`${own.address}/`, 360);
  await page.getByRole('link', { name: 'पुरानो घट्ट' }).click();
  await expect.poll(() => page.locator('h1').textContent()).toBe('पुरानो घट्ट');
  await page.close();
});
