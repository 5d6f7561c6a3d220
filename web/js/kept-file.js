/** All kept sheets as one file, and back. What a file holds is read by the core, which refuses what is no sheet. */
const KIND = "gasbasis kept sheets", SCHEMA = 1;
const PORTION = 100_000;               // characters to the core at a time

/** @param {import("./kept-store.js").Row[]} rows */
export function writeKeptFile(rows) {
  const sheets = rows.map(({ sheet, figure, created, changed }) => ({ sheet, figure, created, changed }));
  return JSON.stringify({ kind: KIND, schema: SCHEMA, sheets }, null, 1);
}

/** @param {string} text whether it may be such a file */
export const isKeptFile = (text) => text.trimStart().startsWith("{") && text.slice(0, 200).includes(`"${KIND}"`);

/**
 * @param {string} text @param {{ask: (request: object) => Promise<any>}} core
 * @returns {Promise<{entries: {sheet: object, figure: string}[], refused: string[]}>}
 */
export async function readKeptFile(text, core) {
  const data = parsed(text);
  if (data?.kind !== KIND || !Array.isArray(data.sheets)) throw new Error("This is no file of kept sheets. One is written by “Save all as one file”.");
  if (data.schema !== SCHEMA) throw new Error("This file is of a newer version. Reload the page with a network, then take it in again.");
  const entries = [], refused = [];
  for (const portion of portions(data.sheets)) {
    const answer = await core.ask({ task: "check_sheets", sheets: portion.map((one) => one?.sheet ?? null) });
    answer.checked.forEach(({ sheet, problem }, index) => {
      if (problem) refused.push(problem.message);
      else entries.push({ sheet, figure: typeof portion[index].figure === "string" ? portion[index].figure.slice(0, 200) : "" });
    });
  }
  return { entries, refused };
}

function parsed(text) {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

function* portions(sheets) {
  let portion = [], size = 0;
  for (const one of sheets) {
    const length = JSON.stringify(one ?? null).length;
    if (portion.length && size + length > PORTION) { yield portion; portion = []; size = 0; }
    portion.push(one);
    size += length;
  }
  if (portion.length) yield portion;
}
