// `npm run picture`: takes the README's picture from the running app on the demo scene.
import { statSync } from 'node:fs';
import process from 'node:process';
import { chromium } from 'playwright';
import { preview } from 'vite';
import { findChromium } from './chromium.mjs';
import { succeeds } from './command.mjs';

const PICTURE = 'apps/web/picture.png';
const MOST_BYTES = 200_000;

if (!succeeds('npm run build')) process.exit(1);
const server = await preview({ configFile: false, root: 'apps/web', logLevel: 'warn' });
const browser = await chromium.launch({ executablePath: findChromium() });
const page = await browser.newPage({ viewport: { width: 1160, height: 720 }, reducedMotion: 'reduce' });
await page.goto(`${server.resolvedUrls?.local[0]}?demo`);
await page.getByText('12 rotation tracks in').waitFor();
await page.getByRole('searchbox', { name: 'Find a track' }).fill('beetle-ankle');
await page.locator('slew-roster .option').first().click();
await page
  .getByRole('button', { name: /^Re-seat from key 22/ })
  .first()
  .click();
await page.getByRole('button', { name: 'Apply it' }).waitFor();
await page.evaluate(() => scrollTo(0, 0));
await page.mouse.move(0, 0);
await page.screenshot({ path: PICTURE });
await browser.close();
await server.close();
const { size } = statSync(PICTURE);
console.log(`${PICTURE}: ${size} bytes`);
if (size > MOST_BYTES) throw new Error(`The picture may have ${MOST_BYTES} bytes.`);
process.exit();
