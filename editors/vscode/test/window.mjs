// Opens the note in VS Code as a user does and takes pictures of the window.
//   node window.mjs ADDRESS FOLDER NOTE PICTURES
// Prints what the page itself shows: underlined places, value hints, the hover.
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { createRequire } from 'node:module';

const [address, folder, note, pictures, review] = process.argv.slice(2);
const { chromium } = createRequire(process.env.INKJOULE_CACHE + '/vscode/')('playwright-core');
const { values } = JSON.parse((await import('node:fs')).readFileSync(review, 'utf8')).notes[0];

let failed = 0;
function check(title, good, why = '') {
  console.log(`${good ? 'ok  ' : 'FAIL'}  VS Code window: ${title}`);
  if (!good) { failed++; console.log(`      ${why}`); }
}

const profile = mkdtempSync(path.join(tmpdir(), 'inkjoule-chromium.'));
const browser = await chromium.launchPersistentContext(profile, {
  executablePath: process.env.CHROMIUM || '/usr/bin/chromium',
  headless: true,
  viewport: { width: 1280, height: 800 },
  args: ['--no-sandbox', '--disable-gpu', '--disable-dev-shm-usage', '--no-first-run', '--disable-background-networking'],
});
try {
  await look(await browser.newPage());
} catch (error) {
  check('the note opens', false, String(error).split('\n').slice(0, 4).join(' / '));
  for (const page of browser.pages()) await page.screenshot({ path: `${pictures}-error.png` }).catch(() => {});
} finally {
  await browser.close();
  rmSync(profile, { recursive: true, force: true });
}
process.exit(failed === 0 ? 0 : 1);

async function look(page) {
  page.setDefaultTimeout(45000);
  await page.goto(`${address}/?folder=${encodeURIComponent(folder)}`);
  await page.locator('.explorer-folders-view .monaco-list-row', { hasText: note }).dblclick();
  await page.locator('.squiggly-error').first().waitFor();
  check('a finding is underlined', true);

  const hinted = values.find((v) => !v.input && v.shown);
  const wanted = hinted.shown.replace(/\s+/g, ' ');
  const found = await page.waitForFunction(hasText, wanted, { timeout: 15000 }).catch(() => null);
  check(`the value ${wanted} stands in the text`, found !== null, await page.locator('.view-lines').innerText());
  await page.waitForTimeout(500);
  await page.screenshot({ path: `${pictures}-note.png` });

  const place = await page.locator('.squiggly-error').first().boundingBox();
  await page.mouse.move(place.x + 4, place.y + place.height / 2, { steps: 4 });
  const hover = page.locator('.monaco-hover:not(.hidden) .hover-contents').first();
  await hover.waitFor({ timeout: 15000 }).catch(() => {});
  await page.waitForTimeout(800);
  check('hovering over the underline opens a text', await hover.isVisible());
  await page.screenshot({ path: `${pictures}-hover.png` });

  await page.mouse.move(5, 5);
  await page.keyboard.press('Control+Shift+M');
  await page.locator('.markers-panel .monaco-list-row').first().waitFor({ timeout: 15000 }).catch(() => {});
  const rows = await page.locator('.markers-panel .monaco-list-row').count();
  check('the findings are listed under Problems', rows > 1, `${rows} rows`);
  await page.screenshot({ path: `${pictures}-problems.png` });
}

/** Runs in the page: does a line of the note show the text? */
function hasText(wanted) {
  return [...document.querySelectorAll('.view-line')].some((line) =>
    line.textContent.replace(/[\s\u00a0]+/g, ' ').includes(wanted));
}
