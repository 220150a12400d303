// What the tests need besides packages: installed with apt-get where that is possible.
import { spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync } from 'node:fs';

/** True if the file can be run. @param {string} file */
export const runs = (file) => {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

/**
 * Installs a Debian package; true if that went well. Only root on Debian and its kin can.
 * @param {string} name as the package is called
 * @param {string} called what to call it in the message
 */
export function aptInstall(name, called) {
  if (process.platform !== 'linux' || process.getuid?.() !== 0 || !existsSync('/usr/bin/apt-get')) return false;
  console.log(`${called} is missing: installing it with apt-get …`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  /** @param {string[]} args */
  const apt = (...args) =>
    spawnSync('apt-get', args, { env, stdio: ['ignore', 'ignore', 'inherit'], timeout: 15 * 60_000 }).status === 0;
  return apt('update') && apt('install', '-y', '--no-install-recommends', name);
}
