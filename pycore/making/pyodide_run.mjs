/**
 * Run one function of one Python file inside Pyodide in Node.
 *
 *   node pyodide_run.mjs job.json
 *
 * The job: {pyodide, stdlib, mounts: {"/in": folder}, path: [...], script, call, argument}. The function
 * gets `argument` as JSON text and returns JSON text (or an awaitable of it), written to `result`.
 */
import { readFileSync, writeFileSync } from "node:fs";
import { pathToFileURL } from "node:url";

process.on("uncaughtException", (error) => {      // Node would print the engine's source, one line of a megabyte
  console.error(String(error.message ?? error));
  process.exit(1);
});

const job = JSON.parse(readFileSync(process.argv[2], "utf8"));
const { loadPyodide } = await import(pathToFileURL(`${job.pyodide}/pyodide.mjs`).href);
const lock = JSON.parse(readFileSync(`${job.pyodide}/pyodide-lock.json`, "utf8"));

const python = await loadPyodide({
  indexURL: job.pyodide,
  stdLibURL: job.stdlib,
  lockFileContents: { info: lock.info, packages: {} },
  packageBaseUrl: job.pyodide,
  env: { HOME: "/home/pyodide", ...job.env },
});
for (const [place, root] of Object.entries(job.mounts)) {
  python.FS.mkdirTree(place);
  python.FS.mount(python.FS.filesystems.NODEFS, { root }, place);
}
const path = python.pyimport("sys").path;
job.path.forEach((entry, index) => path.insert(index, entry));

try {
  const answered = await python.pyimport(job.script)[job.call](JSON.stringify(job.argument));
  writeFileSync(job.result, answered);
} catch (error) {
  console.error(String(error.message ?? error));
  process.exitCode = 1;
}
