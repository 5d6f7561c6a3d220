/** What can be done with kept sheets. Whatever takes the place of a sheet somebody was working on, that sheet is kept first. */
import { keepChange, keepMany, keepNew, keepUnlessKept, keptRows, onKeptElsewhere, putBack, removeKept } from "../kept-store.js";
import { readKeptFile, writeKeptFile } from "../kept-file.js";
import { emptySheet, isEmpty } from "../state.js";

/**
 * @param {{state: any, core: any, headline: () => string, show: (sheet: object, more?: object) => void}} page
 *   `show` puts a sheet on the page.
 */
export function keptActs({ state, core, headline, show }) {
  const say = (text, actions = []) => state.change({ aside: { text, actions } });

  async function list() {
    try {
      state.change({ rows: await keptRows(), rowsProblem: "" });
    } catch (error) {
      state.change({ rows: [], rowsProblem: error.message });
    }
  }
  onKeptElsewhere(() => { if (state.get().rows) list(); });

  /** Do it, show the list as it then is; what goes wrong is said. @param {() => Promise<void>} work */
  async function doing(work) {
    try {
      await work();
      await list();
    } catch (error) {
      state.change({ rowsProblem: error.message });
      say(error.message);
    }
  }

  async function keep({ title, anew }) {
    const { sheet: before, row } = state.get(), sheet = { ...before, title };
    await doing(async () => {
      navigator.storage?.persist?.().catch(() => {});       // asked when there is something worth keeping
      const kept = row && !anew ? await keepChange(row, sheet, headline()) : { row: await keepNew(sheet, headline()), copied: false };
      const moved = state.get().sheet === before ? sheet : { ...state.get().sheet, title };      // somebody may have typed on meanwhile
      show(moved, { row: kept.row, pristine: moved === sheet ? moved : null, answer: state.get().answer });
      say(kept.copied ? `${nameOf(kept.row)} was changed or deleted in another tab meanwhile: this is kept as a sheet of its own.` : `Kept as ${nameOf(kept.row)}.`);
    });
  }

  /** Put another sheet on the page; what was there is kept. @param {object} sheet a whole one @param {object} [more] */
  async function replace(sheet, more = {}) {
    const { sheet: here, pristine, row } = state.get(), figure = headline();
    const worth = !isEmpty(here) && here !== pristine;
    show(sheet, { row: null, pristine: null, editing: null, sent: null, before: !isEmpty(here) ? { sheet: here, row } : state.get().before, ...more });
    if (!worth) return;
    const back = [["Back to it", { type: "back" }]];
    try {
      const kept = await keepUnlessKept(here, figure, row && here.title ? `${here.title} (as left)` : here.title);
      if (kept && !isEmpty(state.get().sheet)) say(`What was on the page is kept: ${nameOf(kept)}.`, back);
      if (kept && state.get().rows) list();
    } catch (error) {
      say(`What was on the page was not kept. ${error.message} It can be brought back as long as this page stays open.`, back);
    }
  }

  return {
    replace,
    acts: {
      kept: () => list(),
      keep,
      "open-kept": ({ row }) => { const sheet = { ...emptySheet(), ...row.sheet }; replace(sheet, { row, pristine: sheet, panel: "" }); },
      duplicate: ({ row }) => doing(async () => {
        const copy = await keepNew({ ...row.sheet, title: `${row.sheet.title || row.figure || row.sheet.hold} (copy)` }, row.figure);
        say(`Kept as “${copy.sheet.title}”.`);
      }),
      "delete-kept": ({ row }) => doing(async () => {
        const gone = await removeKept(row.id);
        if (gone) say(`${nameOf(gone)} is deleted.`, [["Undo", { type: "put-back", row: gone }]]);
      }),
      "put-back": ({ row }) => doing(async () => { await putBack(row); say(`${nameOf(row)} is back.`); }),
      "take-in": ({ text }) => doing(async () => {
        const { entries, refused } = await readKeptFile(text, core);
        const fresh = await keepMany(entries), known = entries.length - fresh;
        say([`${fresh} ${fresh === 1 ? "sheet" : "sheets"} taken in`, known ? `${known} were kept here already` : "", refused.length ? `${refused.length} could not be read: ${refused[0]}` : ""].filter(Boolean).join("; ") + ".");
      }),
      back: () => { const { before } = state.get(); if (before) replace(before.sheet, { row: before.row, aside: null, panel: "" }); },
      aside: () => state.change({ aside: null }),
    },
    fileOf: () => writeKeptFile(state.get().rows ?? []),
  };
}

/** @param {any} row @returns {string} the name in quotes, else what it held */
export const nameOf = (row) => `“${row.sheet.title || row.figure || row.sheet.hold || row.sheet.limit}”`;
