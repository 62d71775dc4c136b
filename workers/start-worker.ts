/**
 * Starts a module worker that the page's Content-Security-Policy binds: a worker loaded by URL escapes a policy in a meta
 * tag, one loaded from a blob inherits it. The blob holds one import of `url` (relative ones are taken from the page, as
 * Vite's `?worker&url` gives them) and is revoked once the worker has loaded it. Page side only.
 */
export function startModuleWorker(url: string): Worker {
  const absolute = new URL(url, document.baseURI).href;
  const starter = URL.createObjectURL(
    new Blob([`import ${JSON.stringify(absolute)};`], { type: 'text/javascript' }),
  );
  const worker = new Worker(starter, { type: 'module' });
  const revoke = () => URL.revokeObjectURL(starter);
  worker.addEventListener('message', revoke, { once: true });
  worker.addEventListener('error', revoke, { once: true });
  return worker;
}
