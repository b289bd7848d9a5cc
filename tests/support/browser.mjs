import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

/** Switches every test browser starts with: a new profile, no background traffic, software WebGL2. */
export const chromiumArguments = [
  '--no-sandbox',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--enable-unsafe-swiftshader',
];

const names = [
  'chromium',
  'chromium-browser',
  'google-chrome',
  'google-chrome-stable',
  'chrome',
  'microsoft-edge',
];

const fixedPlaces = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
];

function isExecutable(path) {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** Path of an installed Chrome, Chromium or Edge; `ELLIPSITE_BROWSER` overrides; null when there is none. */
export function findBrowser() {
  const folders = (process.env.PATH ?? '').split(delimiter);
  const candidates = [
    process.env.ELLIPSITE_BROWSER,
    ...names.flatMap((name) => folders.map((folder) => join(folder, name))),
    ...fixedPlaces,
  ];
  return candidates.filter(Boolean).find(isExecutable) ?? null;
}
