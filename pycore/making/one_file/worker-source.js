/** In the one-file edition the worker's text is in the page, and its files are posted to it before anything else. */
export function makeWorker() {
  const address = URL.createObjectURL(new Blob([globalThis.ONE_FILE.worker], { type: "text/javascript" }));
  const worker = new Worker(address, { name: "gasbasis core" });
  URL.revokeObjectURL(address);
  worker.postMessage({ type: "files", files: globalThis.ONE_FILE.files });
  return worker;
}
