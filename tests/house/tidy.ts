import type { Breach, Files } from './floors.ts';

const LIMIT = 450;

/** What may lie at the top; dot-files are for tools that insist on them. */
const TOP = [
  ...[
    'README.md',
    'DEVELOPERS.md',
    'LICENSE',
    'package.json',
    'package-lock.json',
    'tsconfig.json',
    'svelte.config.js',
  ],
  ...['vite.config.ts', 'vitest.config.ts', 'eslint.config.js', 'src', 'tests', 'static', 'examples'],
];

/** Put together from halves, so that this file passes its own rule. */
const half = (a: string, b: string): string => a + b;
const MACHINE_PATHS = new RegExp(
  [
    half('/wo', 'rk/'),
    half('/tm', 'p/'),
    half('/ho', 'me/'),
    half('/ro', 'ot/'),
    half('/Us', 'ers/'),
    half('[A-Z]:\\\\Us', 'ers'),
  ]
    // Not inside a longer path or an address, where the same letters mean nothing.
    .map((path) => `(?<![\\w.)}/-])${path}`)
    .join('|'),
);
/** Names of standards and the machine itself; any other host would be a promise that somebody else keeps. */
const HOSTS = /^(www\.w3\.org|json-schema\.org|127\.0\.0\.1|localhost|(.+\.)?example(\.(com|org|net|invalid))?)$/;

const SWITCHES = [
  half('@ts-', 'ignore'),
  half('@ts-', 'nocheck'),
  half('eslint-', 'disable'),
  half('svelte-', 'ignore'),
];
const LEFT_OUT = /\b(it|test|describe|bench)\.(skip|only|todo|fails|skipIf|runIf)\b/;

export function checkTidiness(files: Files): Breach[] {
  const breaches: Breach[] = [];
  const report = (rule: string, file: string, what: string): void => void breaches.push({ rule, file, what });
  for (const [file, text] of files) {
    const top = file.split('/')[0] ?? '';
    if (!top.startsWith('.') && !TOP.includes(top)) report('the top level holds only what the house lists', file, top);
    const lines = text.split('\n');
    if (/^src\/.*\.(ts|svelte|mjs)$/.test(file) && lines.length - 1 > LIMIT) {
      report(`a file can be read in a sitting (${LIMIT} lines)`, file, `${lines.length - 1} lines`);
    }
    if (file === 'package-lock.json') {
      if (/"resolved":\s*"http/.test(text)) report('the lock names no host', file, '"resolved" addresses');
      continue;
    }
    lines.forEach((line, i) => {
      const at = `line ${i + 1}: ${line.trim().slice(0, 100)}`;
      if (MACHINE_PATHS.test(line)) report('no path of one machine (a clone lies elsewhere)', file, at);
      for (const [, host] of line.matchAll(/\bhttps?:\/\/([^\s/:'"`)>\]$]+)/g)) {
        if (host && !HOSTS.test(host)) report('no host names (the tool works offline)', file, at);
      }
      if (/^(src|tests)\//.test(file)) {
        const off = SWITCHES.find((word) => line.includes(word));
        if (off) report('no comment switches a check off', file, at);
        if (/\.test\.ts$/.test(file) && LEFT_OUT.test(line)) report('no test is left out or preferred', file, at);
      }
    });
  }
  return breaches;
}
