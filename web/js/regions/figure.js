/** The figure, always in view: value or spread, unit, full basis, what it depends on. */
import { part, say } from "../page.js";

const QUIET_MS = 700;                  // a reader is told the figure when it has come to rest
const NONE = "—";

/** @param {HTMLElement} root @param {HTMLElement} spoken @param {(intention: object) => void} dispatch */
export function mountFigure(root, spoken, dispatch) {
  let timer = 0, told = "";
  const usual = root.querySelector('[data-action="usual"]'), toDoubts = part(root, "to-doubts"), mend = root.querySelector('[data-action="mend"]');
  const verdict = part(root, "verdict"), sentence = part(root, "sentence");
  usual.addEventListener("click", () => dispatch({ type: "usual" }));
  mend.addEventListener("click", () => document.getElementById(`${mend.dataset.side}-text`)?.focus());
  return (state) => {
    const words = wording(state), judged = state.answer?.verdict;
    root.dataset.busy = String(state.busy);
    say(part(root, "head"), words.head);
    say(part(root, "value"), words.value);
    say(part(root, "basis"), words.basis);
    sentence.hidden = !words.sentence;
    say(sentence, words.sentence);
    verdict.hidden = !judged;
    verdict.dataset.shape = judged?.shape ?? "";
    say(verdict.querySelector("span"), judged ? `Limit ${judged.limit_text}: ${judged.sentence}` : "");
    const open = openDoubts(state.answer), side = words.problem?.field.split(".")[0] ?? "";
    usual.hidden = !open.some((doubt) => doubt.usual);
    toDoubts.hidden = !open.length;
    mend.hidden = !side || !document.getElementById(`${side}-text`);
    mend.dataset.side = side;
    part(root, "actions").hidden = usual.hidden && toDoubts.hidden && mend.hidden;
    const now = [words.value, words.sentence, judged ? verdict.textContent.trim() : "", words.basis].filter((text) => text && text !== NONE).join(", ");
    if (now === told) return;
    told = now;
    clearTimeout(timer);
    timer = setTimeout(() => say(spoken, now), QUIET_MS);
  };
}

const openDoubts = (answer) => (answer?.doubts ?? []).filter((doubt) => doubt.state === "open");

/** @param {any} state @returns {{head: string, value: string, basis: string, sentence: string, problem?: any}} */
function wording(state) {
  const { answer, sent, core } = state;
  if (!answer) return beforeAnswer(sent, core);
  const what = answer.challenge ? "What the clause could mean" : "Figure";
  const open = openDoubts(answer).length, count = open ? ` · ${open} ${open === 1 ? "doubt" : "doubts"} open` : "";
  if (answer.figure) {
    const { species_text, number_text, unit_text, basis } = answer.figure;
    return { head: `${what}${species_text ? ` · ${species_text}` : ""}${compared(sent)}`, value: `${number_text} ${unit_text}`, basis, sentence: answer.warnings.join(" ") };
  }
  if (answer.spread?.low) {
    const { low, high, unit_text, basis } = answer.spread;
    const range = low.text === high.text ? low.text : `${low.text} to ${high.text}`;
    return { head: `${what}${count}${compared(sent)}`, value: `${range} ${unit_text}`, basis: basis ?? `owed: ${answer.owe.text}`, sentence: answer.sentence };
  }
  const problem = answer.problems.find((one) => one.kind !== "missing" || !["hold", "owe"].includes(one.field));
  return { head: `Figure${count}`, value: NONE, basis: problem ? problem.message : "Type what you hold and what you owe.", sentence: "", problem };
}

function beforeAnswer(sent, core) {
  if (sent) return { head: "Figure · as sent, not yet recomputed here", value: sent.figure, basis: "", sentence: "" };
  const basis = core.phase === "failed" ? "Not computed: the core could not start." : "The core is starting. Type already: it is computed as soon as it is up.";
  return { head: "Figure", value: NONE, basis, sentence: "" };
}

function compared(sent) {
  if (!sent || sent.agrees === undefined) return "";
  return sent.agrees ? " · same as sent" : ` · differs: sent as ${sent.figure}`;
}
