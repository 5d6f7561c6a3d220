/**
 * Kept sheets, in IndexedDB. Every change is one transaction and every row carries its version, so that two tabs lose nothing:
 * who changes a row that was changed meanwhile gets a copy of his own.
 *
 * @typedef {{id: string, version: number, sheet: import("./state.js").Sheet, figure: string, created: string, changed: string}} Row
 */
import { openDB } from "../libraries/idb.js";

const DATABASE = "gasbasis", SCHEMA = 1, ROWS = "sheets";
const news = "BroadcastChannel" in globalThis ? new BroadcastChannel("gasbasis.kept") : null;

/** Storage that is full, switched off or taken away; the message is for the person. */
export class NotKept extends Error {}

/** @type {Promise<import("../libraries/idb.js").IDBPDatabase> | null} */
let opened = null;

function database() {
  opened ??= openDB(DATABASE, SCHEMA, {
    upgrade(made) { made.createObjectStore(ROWS, { keyPath: "id" }).createIndex("changed", "changed"); },
    blocking(_old, _new, event) { /** @type {any} */ (event.target).close(); opened = null; },     // a newer page in another tab goes first
    terminated() { opened = null; },
  }).catch((error) => { opened = null; throw error; });
  return opened;
}

/** One transaction over all rows. @template T @param {IDBTransactionMode} mode @param {(store: any) => Promise<T>} work @returns {Promise<T>} */
async function within(mode, work) {
  try {
    const transaction = (await database()).transaction(ROWS, mode);
    const [result] = await Promise.all([work(transaction.store), transaction.done]);
    if (mode === "readwrite") news?.postMessage("changed");
    return result;
  } catch (error) {
    throw new NotKept(refusal(error));
  }
}

function refusal(error) {
  if (error.name === "QuotaExceededError") return "The storage of this device is full, so nothing was kept. What you typed is still here: make room, or pass it on as a link or a file.";
  if (error.name === "VersionError") return "A newer version of this page keeps the sheets. Reload this tab.";
  return "This browser does not let the page keep sheets: storage is switched off, or this is a private window. Pass the sheet on as a link or a file.";
}

/** @param {() => void} listener called when another tab changed the rows */
export function onKeptElsewhere(listener) {
  news?.addEventListener("message", listener);
}

/** Every row, the one changed last first. @returns {Promise<Row[]>} */
export const keptRows = () => within("readonly", async (store) => (await store.index("changed").getAll()).reverse());

/** @param {import("./state.js").Sheet} sheet @param {string} figure */
export function keepNew(sheet, figure) {
  return within("readwrite", (store) => add(store, sheet, figure));
}

/** Many at once, all or none. @param {{sheet: import("./state.js").Sheet, figure: string}[]} entries */
export function keepMany(entries) {
  return within("readwrite", async (store) => {
    const known = new Set((await store.getAll()).map(contentOf)), fresh = entries.filter((entry) => !known.has(contentOf(entry)));
    for (const { sheet, figure } of fresh) await add(store, sheet, figure);
    return fresh.length;
  });
}

/**
 * What is there already is not kept twice.
 * @param {import("./state.js").Sheet} sheet @param {string} figure @param {string} title what it is called if it is kept @returns {Promise<Row | null>} the new row
 */
export function keepUnlessKept(sheet, figure, title) {
  return within("readwrite", async (store) => {
    const content = contentOf({ sheet });
    return (await store.getAll()).some((row) => contentOf(row) === content) ? null : add(store, { ...sheet, title }, figure);
  });
}

/** Change a row that was at `version`. Where it is no longer, or has gone, this becomes a row of its own. @returns {Promise<{row: Row, copied: boolean}>} */
export function keepChange({ id, version }, sheet, figure) {
  return within("readwrite", async (store) => {
    const there = await store.get(id);
    if (there?.version !== version) return { row: await add(store, sheet, figure), copied: true };
    const row = { ...there, sheet, figure, version: version + 1, changed: now() };
    await store.put(row);
    return { row, copied: false };
  });
}

/** @param {string} id @returns {Promise<Row | undefined>} the row as it was, to put back */
export function removeKept(id) {
  return within("readwrite", async (store) => {
    const row = await store.get(id);
    await store.delete(id);
    return row;
  });
}

/** @param {Row} row */
export const putBack = (row) => within("readwrite", (store) => store.put(row));

async function add(store, sheet, figure) {
  const at = now(), row = { id: crypto.randomUUID?.() ?? `${at}-${Math.random()}`, version: 1, sheet, figure, created: at, changed: at };
  await store.add(row);
  return row;
}

const now = () => new Date().toISOString();
const sorted = (record) => Object.entries(record ?? {}).filter(([, text]) => text).sort(([one], [other]) => (one < other ? -1 : 1));
/** @param {import("./state.js").Sheet} one @param {import("./state.js").Sheet} other */
export const sameSheet = (one, other) => contentOf({ sheet: one }) === contentOf({ sheet: other });
/** What makes two sheets the same, whatever the order of their parts; a part that is empty is not there. */
const contentOf = ({ sheet }) => JSON.stringify(sorted(sheet).filter(([name]) => name !== "schema").map(([name, part]) => [name, typeof part === "object" ? sorted(part) : part]).filter(([, part]) => part.length));
