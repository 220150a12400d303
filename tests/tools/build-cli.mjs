// Builds the command line into one file without dependencies: dist/cli/spooltable.js.
import { mkdirSync, mkdtempSync, renameSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'vite';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** Bundle a TypeScript entry for Node into `outFile`; in place at once, so that two builds cannot mix. */
export async function bundle(entry, outFile) {
  mkdirSync(dirname(outFile), { recursive: true });
  const work = mkdtempSync(join(dirname(outFile), '.build-'));
  try {
    await build({
      configFile: false,
      root,
      logLevel: 'silent',
      publicDir: false,
      ssr: { noExternal: true },
      build: {
        ssr: entry,
        outDir: work,
        target: 'node20',
        rolldownOptions: { output: { entryFileNames: 'out.js', codeSplitting: false } },
      },
    });
    renameSync(join(work, 'out.js'), outFile);
  } finally {
    rmSync(work, { recursive: true, force: true });
  }
}

export const buildCli = () => bundle(join(root, 'src/cli/main.ts'), join(root, 'dist/cli/spooltable.js'));

if (process.argv[1] === fileURLToPath(import.meta.url)) await buildCli();
