import { createHash } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import { extname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Plugin, Rolldown } from 'vite';
import { PROGRAM_ID } from '../../src/worker/thread.ts';

const SERVICE_WORKER = fileURLToPath(new URL('../../src/app/offline/service-worker.js', import.meta.url));
export const ONE_FILE = 'spooltable.html';
/** Static files that an installed editor shows. */
const STATIC = ['manifest.webmanifest', 'icon.svg', 'icon-192.png', 'icon-512.png'];
const TYPES: Readonly<Record<string, string>> = {
  '.woff2': 'font/woff2',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
};

/** Name below the output folder → content. */
export type Built = ReadonlyMap<string, string | Uint8Array>;

/** Fails on a gap: a page that silently lacks a file would be blank or wrong where nobody looks. */
function textOf(built: Built, name: string): string {
  const content = built.get(name);
  if (content === undefined) throw new Error(`The page names ${name}, which was not built.`);
  return typeof content === 'string' ? content : Buffer.from(content).toString('utf8');
}

/** Script text that no tag inside it can end. */
const inScript = (code: string): string => code.replace(/<\/(script)/gi, '<\\/$1').replaceAll('<!--', '<\\!--');

/** Style with every font and picture inside it. */
function withFonts(style: string, built: Built): string {
  return style.replace(/url\((['"]?)(?!data:)([^'")]+)\1\)/g, (_, _quote: string, address: string) => {
    const name = `assets/${address.replace(/^\.\//, '')}`;
    const type = TYPES[extname(name)];
    const content = built.get(name);
    if (content === undefined || type === undefined)
      throw new Error(`The style names ${address}, which was not built.`);
    return `url(data:${type};base64,${Buffer.from(content).toString('base64')})`;
  });
}

/** The editor as one page that opens from disk: scripts, styles, fonts and the program of the analysis inside it. */
export function oneFile(built: Built): string {
  const threads = [...built.keys()].filter((name) => /\.worker-[^/]+\.js$/.test(name));
  const scripts = [...built.keys()].filter((name) => name.endsWith('.js') && !threads.includes(name));
  const [thread] = threads;
  if (thread === undefined || threads.length > 1 || scripts.length !== 1) {
    throw new Error(`One script and one thread go into ${ONE_FILE}; there are ${[...scripts, ...threads].join(', ')}.`);
  }
  const program = `<script type="text/plain" id="${PROGRAM_ID}">${inScript(textOf(built, thread))}</script>\n`;
  const page = textOf(built, 'index.html')
    .replace(/<link rel="manifest"[^>]*>\s*/g, '')
    .replace(/<link rel="stylesheet"[^>]*href="\.\/([^"]+)"[^>]*>/g, (_, name: string) => {
      return `<style>${withFonts(textOf(built, name), built)}</style>`;
    })
    .replace(/<script type="module"[^>]*src="\.\/([^"]+)"[^>]*><\/script>/g, (_, name: string) => {
      return `${program}<script type="module">${inScript(textOf(built, name))}</script>`;
    });
  const left = /<(?:script|link)[^>]*(?:src|href)="(?!data:)[^"]*"/.exec(
    page.replace(/<script[^>]*>[^]*?<\/script>/g, ''),
  );
  if (left) throw new Error(`${ONE_FILE} would still load ${left[0]}.`);
  return page;
}

/** The service worker with all files of this build; its version changes exactly when one of them does. */
export function serviceWorker(source: string, built: Built): string {
  const files = [...built.keys()].sort();
  const hash = createHash('sha256').update(source);
  for (const name of files) hash.update(name).update(built.get(name) ?? '');
  return source
    .replace('VERSION', hash.digest('hex').slice(0, 16))
    .replace('FILES = []', `FILES = ${JSON.stringify(['./', ...files.filter((name) => name !== 'index.html')])}`);
}

const contentOf = (file: Rolldown.OutputAsset | Rolldown.OutputChunk): string | Uint8Array =>
  file.type === 'chunk' ? file.code : file.source;

/** Makes each build of the editor usable without a network, in two ways: installed, and as one file. */
export function offline(): Plugin {
  return {
    name: 'spooltable-offline',
    apply: 'build',
    writeBundle({ dir }, bundle) {
      if (dir === undefined) return;
      const built = new Map(Object.entries(bundle).map(([name, file]) => [name, contentOf(file)]));
      writeFileSync(join(dir, ONE_FILE), oneFile(built));
      for (const name of STATIC) built.set(name, readFileSync(join(dir, name)));
      writeFileSync(join(dir, 'service-worker.js'), serviceWorker(readFileSync(SERVICE_WORKER, 'utf8'), built));
    },
  };
}
