/**
 * The one state of the page: replaced, never mutated. Who wants to know subscribes.
 *
 * @typedef {{hold: string, gas: string, owe: string, limit: string, sample: string, prepared: string, emission: string, settled: Record<string, string>, notes: Record<string, string>, rule_book: string, title: string}} Sheet
 */

/** @returns {Sheet} */
export function emptySheet() {
  return { hold: "", gas: "", owe: "", limit: "", sample: "", prepared: "", emission: "", rule_book: "", title: "", settled: {}, notes: {} };
}

/** The lines of a sheet; those on how the number came about are there only where they are wanted. */
export const WAYS = ["sample", "prepared", "emission"];
export const SIDES = ["hold", "gas", "owe", "limit", ...WAYS];

/** @param {Sheet} sheet */
export const isEmpty = (sheet) => !SIDES.some((side) => sheet[side].trim());

/** Whether a part on how the number came about is on the page: it has a text, or was just asked for. @param {any} state @param {string} side */
export const wanted = (state, side) => Boolean(state.sheet[side].trim()) || state.ways.includes(side);

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
