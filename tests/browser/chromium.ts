import { delimiter, join } from 'node:path';
import { aptInstall, runs } from '../tools/apt.mjs';

const NAMES = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome', 'msedge'];
const PLACES = [
  '/usr/bin/chromium',
  '/snap/bin/chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
];

/** No sandbox: the tests also run as root. The rest keeps the browser from talking to anybody. */
export const CHROMIUM_FLAGS = [
  ...['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking'],
  ...['--disable-component-update', '--disable-sync'],
];

function look(): string | undefined {
  const suffix = process.platform === 'win32' ? '.exe' : '';
  const onPath = (process.env['PATH'] ?? '')
    .split(delimiter)
    .flatMap((folder) => NAMES.map((name) => join(folder, name + suffix)));
  return [...onPath, ...PLACES].find(runs);
}

/** Where Chromium is; on Debian, as root, it is installed if missing. Throws one line that says what to do. */
export function findChromium(): string {
  const told = process.env['CHROMIUM_PATH'];
  if (told) {
    if (runs(told)) return told;
    throw new Error(`CHROMIUM_PATH names ${told}, which cannot be run: correct it or unset it.`);
  }
  const found = look() ?? (aptInstall('chromium', 'Chromium') ? look() : undefined);
  if (found) return found;
  throw new Error('The browser tests need Chromium or Chrome: install it, or set CHROMIUM_PATH to its program file.');
}
