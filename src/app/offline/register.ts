/**
 * Lets the browser keep the program itself, so that it starts without a network and can be installed.
 * A page made of one file has no manifest: it is all there already.
 */
export function keepProgram(): void {
  if (!import.meta.env.PROD || !document.querySelector('link[rel=manifest]')) return;
  if (!('serviceWorker' in navigator)) return;
  // Kept after the first start, not in its way. Where the browser forbids it, the editor just needs its server.
  window.addEventListener(
    'load',
    () => void navigator.serviceWorker.register('./service-worker.js').catch(() => undefined),
  );
}
