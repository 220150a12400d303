import type { Edit } from '../../circuit/edit.ts';
import { RefusedEdit } from '../../circuit/refused.ts';
import { editor } from '../state/editor.svelte.ts';
import { desk } from './desk.svelte.ts';

/** What `run` makes, or undefined after saying in the status line why it was refused. */
export function tryTo<T>(run: () => T): T | undefined {
  try {
    return run();
  } catch (error) {
    if (!(error instanceof RefusedEdit)) throw error;
    desk.refuse(`${error.problem.what} ${error.problem.remedy}`);
    return undefined;
  }
}

/** Do the edit that `make` builds, and say so. False if it was refused. */
export function attempt(make: () => Edit, said: string, burst?: string): boolean {
  return (
    tryTo(() => {
      editor.do(make(), burst);
      if (said !== '') desk.say(said);
      return true;
    }) ?? false
  );
}

/** What is wrong with an edit, in words, without doing it. */
export function faultOf(make: () => Edit): string | undefined {
  try {
    make();
    return undefined;
  } catch (error) {
    if (error instanceof RefusedEdit) return `${error.problem.what} ${error.problem.remedy}`;
    throw error;
  }
}
