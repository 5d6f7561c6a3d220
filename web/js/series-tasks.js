/**
 * The worker's side of a series: a file is mounted, not copied, and Python reads it in pieces.
 *
 * In:  {type: "series", id, file?: File, request: object, book?: boolean, zones?: boolean}
 * Out: {type: "series-progress", id, done, of} · {type: "series-answer", id, answer: string, columns?: Float64Array[], files?: object}
 */
import { PARTS } from "../runtime/parts.js";

const PLACE = "/series";
const loaded = new Set();
let mounted = "";

/** @param {any} python @param {any} message @param {(part: any) => Promise<any>} fetchWheel @param {(python: any, wheels: any[]) => void} addWheels */
export async function seriesTask(python, message, fetchWheel, addWheels) {
  const { id, file, request } = message;
  try {
    if (file) mount(python, file);
    await Promise.all([message.book && "xlsxwriter", message.zones && "tzdata"].filter(Boolean).map(async (name) => {
      if (loaded.has(name)) return;
      addWheels(python, [await fetchWheel(PARTS.later[name])]);
      loaded.add(name);
    }));
    const room = python.pyimport("gasbasis.series.page");
    const text = room.respond(JSON.stringify({ ...request, path: mounted, book: Boolean(message.book) }),
      (done, of) => self.postMessage({ type: "series-progress", id, done, of }));
    const answer = { type: "series-answer", id, answer: text };
    if (request.task === "run" && JSON.parse(text).ok) Object.assign(answer, made(python, room, request, message.book));
    self.postMessage(answer, answer.columns?.map((column) => column.buffer) ?? []);
  } catch (error) {
    self.postMessage({ type: "failed", message: `The series stopped: ${error.message ?? error}` });
  }
}

function mount(python, file) {
  const { FS } = python;
  FS.mkdirTree(PLACE);
  if (mounted) FS.unmount(PLACE);
  mounted = `${PLACE}/readings.csv`;
  FS.mount(FS.filesystems.WORKERFS, { blobs: [{ name: "readings.csv", data: file }] }, PLACE);
}

/** The columns to draw and the files written. */
function made(python, room, request, book) {
  const columns = [0, ...request.settings.species.map((_, place) => place + 1)].map((place) => {
    const proxy = room.column_bytes(place), view = proxy.getBuffer("u8");
    const copy = new Float64Array(view.data.slice().buffer);
    view.release();
    proxy.destroy();
    return copy;
  });
  const files = {};
  for (const [name, path] of Object.entries({ rows: "/tmp/rows.csv", means: "/tmp/means.csv", book: "/tmp/series.xlsx" })) {
    if ((name === "book") !== Boolean(book) && name !== "means") continue;
    if (!python.FS.analyzePath(path).exists) continue;
    files[name] = new Blob([python.FS.readFile(path)]);
    python.FS.unlink(path);
  }
  return { columns, files };
}
