/** The small form under the pieces that changes, adds, settles or takes out one piece. */
import { button, cloned, part, say } from "../page.js";
import { readingButton } from "./readings.js";

/** @param {HTMLElement} place @param {string} side @param {(intention: object) => void} dispatch */
export function mountEditor(place, side, dispatch) {
  let form = null, field = "";

  function close() {
    const opened = field;
    dispatch({ type: "close" });
    document.querySelector(`#${side} [data-field="${CSS.escape(opened)}"]`)?.focus();
  }

  function build(entry, doubt) {
    form = /** @type {any} */ (cloned("editor").firstElementChild);
    const input = form.querySelector("input");
    say(form.querySelector("h3"), entry.title);
    say(part(form, "label"), entry.title);
    input.value = entry.span ? entry.text : "";
    input.placeholder = entry.example;
    if (entry.numeric) input.inputMode = "text";       // units go with the number: a number pad would lock them out
    part(form, "choices").append(...entry.choices.map((choice) => button(choice, () => set(choice))));
    form.addEventListener("submit", (event) => { event.preventDefault(); set(input.value); });
    form.querySelector('[data-action="remove"]').addEventListener("click", () => set(""));
    form.querySelector('[data-action="remove"]').hidden = !entry.span;
    form.querySelector('[data-action="close"]').addEventListener("click", close);
    form.addEventListener("keydown", (event) => { if (event.key === "Escape") { event.stopPropagation(); close(); } });
    place.replaceChildren(form);
    (doubt ? part(form, "readings").querySelector("button") ?? input : input).focus();
    form.scrollIntoView({ block: "nearest" });
  }

  function set(text) {
    dispatch({ type: "edit", side, field, to: text });
  }

  return (state) => {
    const open = state.editing?.side === side ? state.editing : null;
    if (!open) {
      if (form) place.replaceChildren();
      form = null; field = "";
      return;
    }
    const record = state.answer?.[side];
    const entry = record?.pieces.find((piece) => piece.field === open.field) ?? record?.adds.find((add) => add.field === open.field);
    if (!entry) return;
    const doubt = state.answer.doubts.find((one) => one.id === entry.doubt);
    const fresh = !form || field !== open.field;
    field = open.field;
    if (fresh) build(entry, doubt);
    say(part(form, "help"), doubt ? doubt.question : entry.help);
    part(form, "readings").replaceChildren(...(doubt?.readings ?? []).map((reading) => readingButton(doubt, reading, dispatch)));
    const problem = part(form, "problem");
    problem.hidden = !open.problem;
    say(problem, open.problem ? `${open.problem.message} ${open.problem.hint}` : "");
  };
}
