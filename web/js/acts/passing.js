/** Links out and in, and whatever else somebody passes on. */
import { isKeptFile } from "../kept-file.js";
import { figureAsSent } from "../link.js";
import { emptySheet } from "../state.js";

/** @param {{state: any, core: any, headline: () => string, restate: () => void, replace: (sheet: object, more?: object) => Promise<void>, dispatch: (intention: object) => void}} page */
export function passingActs({ state, core, headline, restate, replace, dispatch }) {
  const problemOf = (error) => error.problem ?? { message: error.message, hint: "" };

  async function link({ withNames }) {
    const { sheet, answer } = state.get(), file = JSON.stringify({ kind: "gasbasis sheet", sheet: { schema: 1, ...sheet } }, null, 1), passed = { sheet, answer, file, code: "", problem: "" };
    state.change({ passed: { ...state.get().passed, sheet, answer } });      // being asked for: not once more
    try {
      const { code } = await core.ask({ task: "link", sheet: { schema: 1, ...sheet }, figure: headline(), with_names: withNames }, { channel: "link" });
      state.change({ passed: { ...passed, code } });
    } catch (error) {
      if (error.problem?.kind !== "superseded") state.change({ passed: { ...passed, problem: `${problemOf(error).message} ${problemOf(error).hint}` } });
    }
  }

  /** Opens a link's code. What was on the page is kept first. @param {string} code */
  async function open(code) {
    state.change({ sent: { figure: figureAsSent(code) } });
    try {
      const { sheet, as_sent } = await core.ask({ task: "open", code });
      await putSent(sheet, as_sent);
    } catch (error) {
      state.change({ sent: null, notice: `${problemOf(error).message} ${problemOf(error).hint}` });
      restate();
    }
  }

  function putSent(opened, figure) {
    const sheet = { ...emptySheet(), ...opened };
    return replace(sheet, { sent: { figure, sheet }, pristine: sheet, panel: "" });
  }

  async function receive({ text }) {
    if (isKeptFile(text)) {
      state.change({ received: null, panel: "kept" });
      dispatch({ type: "kept" });
      dispatch({ type: "take-in", text });
      return;
    }
    try {
      const found = await core.ask({ task: "receive", text });
      if (found.form === "record") {
        await replace({ ...emptySheet(), ...found.sheet }, { received: { record: found }, amends: null });
      } else {
        state.change({ received: null });
        await putSent(found.sheet, found.as_sent ?? "");
      }
    } catch (error) {
      state.change({ received: { problem: problemOf(error) } });
    }
  }

  return { open, acts: { link, receive } };
}
