/** What the person is doing, kept as it is typed so that a reload or an update loses nothing: of this tab, else of the tab used last. */
const SHEET = "gasbasis.sheet";
const ROW = "gasbasis.row";
const THEME = "gasbasis.theme";
const BY = "gasbasis.by";

/** Each storage can be switched off or full: the page works without, and the inputs are still on it. */
const PLACES = [() => sessionStorage, () => localStorage];

/** @param {string} key @returns {string | null} */
function read(key) {
  for (const place of PLACES) {
    try {
      const text = place().getItem(key);
      if (text !== null) return text;
    } catch {
      // switched off: the next place
    }
  }
  return null;
}

/** @param {string} key @param {string} value */
function write(key, value) {
  for (const place of PLACES) {
    try {
      place().setItem(key, value);
    } catch {
      // full or switched off
    }
  }
}

/** @param {string} key */
function readJson(key) {
  try {
    return JSON.parse(read(key) ?? "null");
  } catch {
    return null;
  }
}

/** @returns {object | null} */
export function sheetInHand() {
  const sheet = readJson(SHEET);
  return sheet && typeof sheet.hold === "string" ? sheet : null;
}

/** Which kept row the sheet in hand came from. @returns {{id: string, version: number} | null} */
export const rowInHand = () => readJson(ROW);

/** @param {object} sheet @param {{id: string, version: number} | null} row */
export function holdOnTo(sheet, row) {
  write(SHEET, JSON.stringify(sheet));
  write(ROW, JSON.stringify(row && { id: row.id, version: row.version }));
}

export const keptTheme = () => read(THEME) ?? "";
/** @param {string} theme */
export const keepTheme = (theme) => write(THEME, theme);

/** Who made the last record here, so that it is typed once. */
export const keptBy = () => read(BY) ?? "";
/** @param {string} by */
export const keepBy = (by) => write(BY, by);
