/** Making a record, amending one, and comparing two sheets. */
import { isoWithOffset } from "../clock.js";
import { keepBy } from "../keeping.js";

/** @param {{state: any, core: any}} page */
export function recordActs({ state, core }) {
  const problemOf = (error) => error.problem ?? { message: error.message, hint: "", field: "" };

  async function record({ by, notes, why }) {
    const { sheet, amends } = state.get();
    keepBy(by);
    const about = { made_at: isoWithOffset(new Date()), made_by: by, notes, ...(amends ? { amends: amends.checksum, why } : {}) };
    try {
      const made = await core.ask({ task: "record", sheet: { schema: 1, ...sheet }, about });
      state.change({ record: { ...made, sheet, problem: null, working: state.get().answer?.working ?? [] } });
    } catch (error) {
      state.change({ record: { problem: problemOf(error) } });
    }
  }

  /** Against a kept row, the sheet before, or what was pasted. */
  async function compare({ row, sheet, text }) {
    const mine = state.get().sheet;
    state.change({ panel: "compare", compared: null });
    try {
      const theirs = row?.sheet ?? sheet ?? (await core.ask({ task: "receive", text })).sheet;
      const found = await core.ask({ task: "compare", mine: { schema: 1, ...mine }, theirs: { schema: 1, ...theirs } });
      state.change({ compared: { ...found, mineSheet: mine, theirsName: row ? row.sheet.title || row.figure : "" } });
    } catch (error) {
      state.change({ compared: { problem: problemOf(error) } });
    }
  }

  return {
    record, compare,
    amend: () => {
      const { received, record: own } = state.get(), amended = own?.record ?? received?.record?.record;
      state.change({ amends: { checksum: amended.checksum, notes: amended.notes ?? "" }, record: null, panel: "record" });
    },
    "leave-amending": () => state.change({ amends: null }),
  };
}
