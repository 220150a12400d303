import { spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';

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

const runs = (file: string): boolean => {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

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
  const found = look() ?? (install() ? look() : undefined);
  if (found) return found;
  throw new Error('The browser tests need Chromium or Chrome: install it, or set CHROMIUM_PATH to its program file.');
}

function install(): boolean {
  if (process.platform !== 'linux' || process.getuid?.() !== 0 || !existsSync('/usr/bin/apt-get')) return false;
  console.log('Chromium is missing: installing it with apt-get …');
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const apt = (...args: string[]): boolean =>
    spawnSync('apt-get', args, { env, stdio: ['ignore', 'ignore', 'inherit'], timeout: 15 * 60_000 }).status === 0;
  return apt('update') && apt('install', '-y', '--no-install-recommends', 'chromium');
}
