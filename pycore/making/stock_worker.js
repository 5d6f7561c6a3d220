/**
 * For `build.py bench` only: the worker as Pyodide's documentation sets one up - its lock file, its standard
 * library as sources, wheels as published through loadPackage. Same messages as core-worker.js.
 */
import { loadPyodide } from "../runtime/pyodide.mjs";
import { WHEELS } from "../runtime/stock.js";

const RUNTIME = new URL("../runtime/", import.meta.url).href;
let answer = null;

self.addEventListener("message", async ({ data }) => {
  if (data.type !== "start") {
    self.postMessage({ id: data.id, answer: answer(data.request) });
    return;
  }
  try {
    const python = await loadPyodide({ indexURL: RUNTIME });
    await python.loadPackage(WHEELS.map((wheel) => RUNTIME + wheel), { messageCallback: () => {} });
    answer = python.pyimport("gasbasis.answer").answer;
    self.postMessage({ type: "ready", version: python.pyimport("gasbasis").__version__ });
  } catch (error) {
    self.postMessage({ type: "failed", message: String(error.message ?? error) });
  }
});
