/** Where the worker comes from; the one-file edition brings its own. */

const LOADED_BY_THEN_MS = 30_000;

/**
 * A worker made from a blob that only imports the real module: a blob worker inherits the page's
 * content security policy, so that a policy given as <meta> governs it too.
 */
export function makeWorker() {
  const module = new URL("core-worker.js", import.meta.url).href;
  const address = URL.createObjectURL(new Blob([`import ${JSON.stringify(module)};`], { type: "text/javascript" }));
  const worker = new Worker(address, { type: "module", name: "gasbasis core" });
  setTimeout(() => URL.revokeObjectURL(address), LOADED_BY_THEN_MS);
  return worker;
}
