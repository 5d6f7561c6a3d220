/**
 * The worker that holds Python. It knows no science: it loads the wheels, keeps one function
 * `answer(request: str) -> str`, and passes texts through it.
 *
 * In:  {type: "start", counted: boolean}, then {id, request: string}
 * Out: {type: "progress", stage, done, of} · {type: "ready", version} · {type: "failed", message}
 *      {id, answer: string}   the JSON text that Python answered
 * A series has a worker of its own with the messages of series-tasks.js.
 */
import { loadPyodide } from "../runtime/pyodide.mjs";
import { ENGINE } from "./engine.js";
import { PARTS } from "../runtime/parts.js";
import { seriesTask } from "./series-tasks.js";

const RUNTIME = new URL("../runtime/", import.meta.url).href;
const WHEELS = "/wheels";

/** @type {((request: string) => string) | null} */
let answer = null;
let python = null;

self.addEventListener("message", (event) => {
  if (event.data.type === "start") start(event.data.counted);
  else if (event.data.type === "series") seriesTask(python, event.data, fetchWheel, addWheels);
  else respond(event.data.id, event.data.request);
});

/** @param {string} stage @param {number} done @param {number} of */
function report(stage, done, of) {
  self.postMessage({ type: "progress", stage, done, of });
}

/** @param {number} id @param {string} request */
function respond(id, request) {
  try {
    self.postMessage({ id, answer: answer(request) });
  } catch (error) {
    // answer() never raises: what arrives here has broken the interpreter itself
    self.postMessage({ type: "failed", message: `Python stopped: ${error.message ?? error}` });
  }
}

/** @param {boolean} counted count the bytes of the engine as they arrive (a first visit) */
async function start(counted) {
  try {
    if (counted) countEngineBytes();
    report("loading", 0, PARTS.engine.size);
    const [started, wheels] = await Promise.all([startPython(), Promise.all(PARTS.wheels.map(fetchWheel))]);
    report("importing", 0, 1);
    python = started;
    addWheels(python, wheels);
    answer = python.pyimport("gasbasis.answer").answer;
    python.pyimport("gasbasis.answer").report_progress_to((done, of) => report("drawing", done, of));
    self.postMessage({ type: "ready", version: python.pyimport("gasbasis").__version__ });
  } catch (error) {
    self.postMessage({ type: "failed", message: `Python could not be started: ${error.message ?? error}` });
  }
}

function startPython() {
  return loadPyodide({
    ...ENGINE,
    indexURL: RUNTIME,
    stdLibURL: RUNTIME + PARTS.stdlib,
    lockFileContents: { info: PARTS.lockInfo, packages: {} },
    packageBaseUrl: RUNTIME,
  });
}

/** @param {{file: string, size: number}} wheel */
async function fetchWheel(wheel) {
  const response = await fetch(RUNTIME + wheel.file);
  if (!response.ok) throw new Error(`${wheel.file} could not be fetched (${response.status})`);
  return { file: wheel.file, bytes: new Uint8Array(await response.arrayBuffer()) };
}

/** The compiled wheels are importable as they lie: they are put on the path, not unpacked. */
function addWheels(python, wheels) {
  python.FS.mkdirTree(WHEELS);
  const path = python.pyimport("sys").path;
  for (const { file, bytes } of wheels) {
    python.FS.writeFile(`${WHEELS}/${file}`, bytes);
    path.append(`${WHEELS}/${file}`);
  }
}

/** Report the engine's bytes as they arrive. Not done on later visits: a copied body loses the compiled-code cache. */
function countEngineBytes() {
  const plainFetch = self.fetch.bind(self);
  self.fetch = async (resource, options) => {
    const response = await plainFetch(resource, options);
    if (!response.ok || !String(resource).endsWith(PARTS.engine.file)) return response;
    let done = 0;
    const counting = new TransformStream({
      transform(chunk, controller) {
        done += chunk.byteLength;
        report("loading", done, PARTS.engine.size);
        controller.enqueue(chunk);
      },
    });
    return new Response(response.body.pipeThrough(counting), { headers: response.headers });
  };
}
