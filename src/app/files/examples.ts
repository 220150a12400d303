/** Circuits that come with the program; the first is the one a newcomer sees. */
const FILES = import.meta.glob<string>('../../../examples/*.spool.json', {
  query: '?raw',
  import: 'default',
  eager: true,
});

export interface Example {
  readonly file: string;
  readonly title: string;
  readonly text: string;
}

/** Opens at the first start, if it is there. */
const DEMO = 'log-deck.spool.json';

function titleOf(text: string, file: string): string {
  try {
    const { name } = JSON.parse(text) as { readonly name?: unknown };
    if (typeof name === 'string') return name;
  } catch {
    // An unreadable example is still listed: opening it says what is wrong.
  }
  return file;
}

export const EXAMPLES: readonly Example[] = Object.entries(FILES)
  .map(([path, text]) => {
    const file = path.slice(path.lastIndexOf('/') + 1);
    return { file, title: titleOf(text, file), text };
  })
  .sort((a, b) => Number(b.file === DEMO) - Number(a.file === DEMO) || a.file.localeCompare(b.file));
