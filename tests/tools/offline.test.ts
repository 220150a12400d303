import { expect, test } from 'vitest';
import { oneFile, serviceWorker } from './offline.ts';
import type { Built } from './offline.ts';

const PAGE = [
  '<link rel="manifest" href="./manifest.webmanifest" />',
  '<script type="module" crossorigin src="./assets/index-1.js"></script>',
  '<link rel="stylesheet" crossorigin href="./assets/index-1.css">',
].join('\n');
const built = (more: Readonly<Record<string, string | Uint8Array>> = {}): Built =>
  new Map<string, string | Uint8Array>(
    Object.entries({
      'index.html': PAGE,
      'assets/index-1.js': 'const a = "</script><!-- $& $1";',
      'assets/analysis.worker-1.js': 'postMessage("</script>")',
      'assets/index-1.css': '@font-face{src:url(./inter-1.woff2)}',
      'assets/inter-1.woff2': new Uint8Array([1, 2, 3]),
      ...more,
    }),
  );

test('the one file holds everything, and no text in a script can end it', () => {
  const page = oneFile(built());
  expect(page).toContain('const a = "<\\/script><\\!-- $& $1";');
  expect(page).toContain('<script type="text/plain" id="spooltable-analysis">postMessage("<\\/script>")</script>');
  expect(page).toContain('url(data:font/woff2;base64,AQID)');
  expect(page).not.toMatch(/href="\.|src="\./);
});

test('what would be missing from the one file fails the build', () => {
  expect(() => oneFile(built({ 'assets/more-1.js': '' }))).toThrow('One script and one thread');
  expect(() => oneFile(built({ 'assets/index-1.css': 'a{src:url(./inter-2.woff2)}' }))).toThrow('inter-2.woff2');
  expect(() => oneFile(built({ 'index.html': `${PAGE}<link rel="icon" href="./icon.svg">` }))).toThrow('icon.svg');
  expect(() => oneFile(built({ 'index.html': PAGE.replace('index-1.js', 'index-2.js') }))).toThrow('index-2.js');
});

test('a service worker knows every file, and has another version as soon as one of them changes', () => {
  const source = "const CACHE = 'spooltable-VERSION';\nconst FILES = [];";
  const first = serviceWorker(source, built());
  expect(first).toContain('"./","assets/analysis.worker-1.js"');
  expect(first).toMatch(/spooltable-[0-9a-f]{16}/);
  expect(serviceWorker(source, built())).toBe(first);
  expect(serviceWorker(source, built({ 'assets/inter-1.woff2': new Uint8Array([1, 2, 4]) }))).not.toBe(first);
});
