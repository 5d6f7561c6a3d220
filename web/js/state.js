/**
 * The one state of the page: replaced, never mutated. Who wants to know subscribes.
 *
 * @typedef {{hold: string, gas: string, owe: string, limit: string, settled: Record<string, string>, notes: Record<string, string>, rule_book: string, title: string}} Sheet
 */

/** @returns {Sheet} */
export function emptySheet() {
  return { hold: "", gas: "", owe: "", limit: "", rule_book: "", title: "", settled: {}, notes: {} };
}

/** @param {Sheet} sheet */
export const isEmpty = (sheet) => !["hold", "gas", "owe", "limit"].some((side) => sheet[side].trim());

/** @param {object} first */
export function createState(first) {
  let state = Object.freeze({ ...first });
  const listeners = new Set();
  return {
    get: () => state,
    /** @param {object} patch */
    change(patch) {
      state = Object.freeze({ ...state, ...patch });
      for (const listener of listeners) listener(state);
    },
    /** @param {(state: object) => void} listener */
    subscribe(listener) {
      listeners.add(listener);
      listener(state);
    },
  };
}
