// A general circuit simulator as second opinion on pressures and flows. The tests do without it where there is none.
import { delimiter, join } from 'node:path';
import { aptInstall, runs } from './apt.mjs';

/** Where ngspice is: NGSPICE_PATH, else on the PATH; undefined if nowhere. */
export function findNgspice() {
  const told = process.env.NGSPICE_PATH;
  if (told) return runs(told) ? told : undefined;
  const name = process.platform === 'win32' ? 'ngspice_con.exe' : 'ngspice';
  return (process.env.PATH ?? '')
    .split(delimiter)
    .map((folder) => join(folder, name))
    .find(runs);
}

/** The same; on Debian, as root, it is installed if missing. */
export const ensureNgspice = () => findNgspice() ?? (aptInstall('ngspice', 'ngspice') ? findNgspice() : undefined);
