import { MediaQuery } from 'svelte/reactivity';

/** True in a window as small as a usual one at 400 %: pages are scrolled, and panels take all of it. */
export const tight = new MediaQuery('(max-width: 360px), (max-height: 300px)');
