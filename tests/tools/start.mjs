// npm start: builds the editor (the same build that the browser tests drive) and serves it on this machine only.
import './die-with-parent.mjs';
import { parseArgs } from 'node:util';
import { fileURLToPath } from 'node:url';
import { build, preview } from 'vite';

const configFile = fileURLToPath(new URL('../../vite.config.ts', import.meta.url));
const USAGE = 'Usage: npm start -- [--port N] [--no-open]';

function fail(message) {
  console.error(message);
  process.exit(1);
}

function readOptions() {
  try {
    const { values } = parseArgs({
      options: { port: { type: 'string' }, 'no-open': { type: 'boolean', default: false } },
    });
    const port = values.port === undefined ? undefined : Number(values.port);
    if (port !== undefined && !(Number.isInteger(port) && port >= 0 && port <= 65535)) {
      fail(`--port takes a number from 0 to 65535, not "${values.port}". ${USAGE}`);
    }
    return { port, open: !values['no-open'] && hasDesktop() };
  } catch (error) {
    return fail(`${error.message} ${USAGE}`);
  }
}

/** Whether a browser window can be expected to appear in front of somebody. */
function hasDesktop() {
  const { env, platform } = process;
  if (env.CI || env.SSH_CONNECTION) return false;
  return platform === 'darwin' || platform === 'win32' || Boolean(env.DISPLAY ?? env.WAYLAND_DISPLAY);
}

const { port, open } = readOptions();
try {
  await build({ configFile, logLevel: 'warn' });
  const server = await preview({
    configFile,
    logLevel: 'error',
    preview: { host: '127.0.0.1', open, ...(port === undefined ? {} : { port, strictPort: port !== 0 }) },
  });
  const address = server.httpServer.address();
  console.log(`Spooltable is ready at http://127.0.0.1:${address.port}/ (Ctrl+C stops it)`);
} catch (error) {
  fail(`The editor could not be started: ${error.message}`);
}
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => process.exit(0));
