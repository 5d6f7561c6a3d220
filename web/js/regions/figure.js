/** The figure, always in view: value or spread, unit, full basis, what it depends on. */
import { part, say } from "../page.js";

const QUIET_MS = 700;                  // a reader is told the figure when it has come to rest

/** @param {HTMLElement} root @param {HTMLElement} spoken @param {(intention: object) => void} dispatch */
export function mountFigure(root, spoken, dispatch) {
  let timer = 0;
  root.querySelector('[data-action="usual"]').addEventListener("click", () => dispatch({ type: "usual" }));
  return (state) => {
    const words = wording(state);
    root.dataset.busy = String(state.busy);
    say(part(root, "head"), words.head);
    say(part(root, "value"), words.value);
    say(part(root, "basis"), words.basis);
    const sentence = part(root, "sentence");
    sentence.hidden = !words.sentence;
    say(sentence, words.sentence);
    const verdict = part(root, "verdict"), judged = state.answer?.verdict;
    verdict.hidden = !judged;
    verdict.dataset.shape = judged?.shape ?? "";
    say(verdict.querySelector("span"), judged ? `Limit ${judged.limit_text}: ${judged.sentence}` : "");
    const open = (state.answer?.doubts ?? []).filter((doubt) => doubt.state === "open");
    root.querySelector('[data-action="usual"]').hidden = !open.some((doubt) => doubt.usual);
    part(root, "to-doubts").hidden = !open.length;
    clearTimeout(timer);
    timer = setTimeout(() => say(spoken, [words.value, words.basis, words.sentence, verdict.textContent.trim()].filter((text) => text && text !== "—").join(", ")), QUIET_MS);
  };
}

/** @param {any} state */
function wording(state) {
  const { answer, sent } = state;
  const what = answer?.challenge ? "What the clause could mean" : "Figure";
  const open = (answer?.doubts ?? []).filter((doubt) => doubt.state === "open").length;
  const count = open ? ` · ${open} ${open === 1 ? "doubt" : "doubts"} open` : "";
  if (answer?.figure) {
    const { species_text, number_text, unit_text, basis } = answer.figure;
    return { head: `${what}${species_text ? ` · ${species_text}` : ""}${compared(sent)}`, value: `${number_text} ${unit_text}`, basis, sentence: answer.warnings.join(" ") };
  }
  if (answer?.spread?.low) {
    const { low, high, unit_text } = answer.spread;
    const range = low.text === high.text ? low.text : `${low.text} to ${high.text}`;
    return { head: `${what}${count}${compared(sent)}`, value: `${range} ${unit_text}`, basis: "", sentence: answer.sentence };
  }
  if (sent && !answer) return { head: "Figure · as sent, not yet recomputed here", value: sent.figure, basis: "", sentence: "" };
  const problem = answer?.problems.find((one) => one.field !== "hold" && one.field !== "owe" || one.kind !== "missing");
  return { head: `Figure${count}`, value: "—", basis: problem ? problem.message : answer ? "Type what you hold and what you owe." : "", sentence: "" };
}

function compared(sent) {
  if (!sent || sent.agrees === undefined) return "";
  return sent.agrees ? " · same as sent" : ` · differs: sent as ${sent.figure}`;
}
