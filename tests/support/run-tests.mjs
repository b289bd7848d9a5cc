import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { findBrowser } from './browser.mjs';

/** `npm test`: makes sure a browser is there (installs Debian's chromium where it may), then runs both projects. */
function installChromium() {
  const mayInstall = existsSync('/usr/bin/apt-get') && process.getuid?.() === 0;
  if (!mayInstall) return;
  console.log("No Chrome, Chromium or Edge found: installing Debian's chromium.");
  spawnSync('apt-get', ['update'], { stdio: 'ignore' });
  spawnSync('apt-get', ['install', '-y', '--no-install-recommends', 'chromium'], { stdio: 'inherit' });
}

if (!findBrowser()) installChromium();
if (!findBrowser()) {
  console.error(
    'The browser tests need Chrome, Chromium or Edge and none was found. Install one, or set ELLIPSITE_BROWSER to its path.',
  );
  process.exit(1);
}
const kernel = spawnSync(process.execPath, ['src/raster/build-kernel.mjs'], { stdio: 'inherit' });
if (kernel.status !== 0) process.exit(kernel.status ?? 1);
const report = process.env.ELLIPSITE_TEST_REPORT;
const reporters = report ? ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`] : [];
const projects = ['--project', 'node', '--project', 'browser'];
const run = spawnSync(
  process.execPath,
  ['node_modules/vitest/vitest.mjs', 'run', ...projects, ...reporters, ...process.argv.slice(2)],
  { stdio: 'inherit' },
);
process.exit(run.status ?? 1);
