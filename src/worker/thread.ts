/** Where a page made of one file carries the program of the analysis: such a page can load no other file. */
export const PROGRAM_ID = 'spooltable-analysis';

let address: string | undefined;

/** A thread that answers questions, from its own file or from the page. */
export function startThread(): Worker {
  const program = document.getElementById(PROGRAM_ID)?.textContent;
  if (!program) return new Worker(new URL('./analysis.worker.ts', import.meta.url), { type: 'module' });
  address ??= URL.createObjectURL(new Blob([program], { type: 'text/javascript' }));
  // A page from disk may start no module this way; the program is built as one script that needs none.
  return new Worker(address);
}
