import type { Action } from 'svelte/action';

/** How far below and above the list a picture is drawn already, px. */
const AHEAD = '200px 0px';

const runs = new WeakMap<Element, () => void>();
let watching: IntersectionObserver | undefined;

/** Runs once, when the thing first comes near the view: most of a long list of pictures is never looked at. */
export const whenSeen: Action<HTMLElement, () => void> = (node, run) => {
  watching ??= new IntersectionObserver(
    (entries) => {
      for (const { target, isIntersecting } of entries) {
        if (!isIntersecting) continue;
        watching?.unobserve(target);
        runs.get(target)?.();
      }
    },
    { rootMargin: AHEAD },
  );
  runs.set(node, run);
  watching.observe(node);
  return { destroy: () => watching?.unobserve(node) };
};
