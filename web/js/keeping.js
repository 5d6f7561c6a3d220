/** What the person was doing, kept on this device so that a reload or an update loses nothing. */
const SHEET = "gasbasis.sheet";
const THEME = "gasbasis.theme";

/** @param {string} key @returns {string | null} */
function read(key) {
  try {
    return localStorage.getItem(key);
  } catch {
    return null;                       // storage can be switched off: the page works without
  }
}

/** @param {string} key @param {string} value */
function write(key, value) {
  try {
    localStorage.setItem(key, value);
  } catch {
    // full or switched off: nothing to be done here, the inputs are still on the page
  }
}

/** @returns {object | null} */
export function keptSheet() {
  try {
    const sheet = JSON.parse(read(SHEET) ?? "null");
    return sheet && typeof sheet.hold === "string" ? sheet : null;
  } catch {
    return null;
  }
}

/** @param {object} sheet */
export const keepSheet = (sheet) => write(SHEET, JSON.stringify(sheet));
export const keptTheme = () => read(THEME) ?? "";
/** @param {string} theme */
export const keepTheme = (theme) => write(THEME, theme);
