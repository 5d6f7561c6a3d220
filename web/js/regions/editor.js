/** The small form right under a piece that changes, adds, settles or takes out this piece. */
import { button, clonedElement, keyed, part, say } from "../page.js";
import { mountComposition } from "./composition.js";
import { readingButton, updateReading } from "./readings.js";

const SHOWN_SPECIES = 6;

/**
 * @param {string} side @param {(intention: object) => void} dispatch
 * @param {(field: string) => HTMLElement | null} pieceOf the button of a field, as it is on the page now
 */
export function mountEditor(side, dispatch, pieceOf) {
  let form = null, field = "";

  function set(text) {
    dispatch({ type: "edit", side, field, to: text });
  }

  function close() {
    pieceOf(field)?.focus();
    dispatch({ type: "close" });
  }

  function build(entry, doubt) {
    form = clonedElement("editor");
    form.setAttribute("aria-label", entry.title);
    const input = part(form, "input"), label = part(form, "label"), remove = form.querySelector('[data-action="remove"]');
    input.id = `${side}-edit`;
    label.htmlFor = input.id;
    say(form.querySelector("h3"), entry.title);
    input.value = entry.span ? entry.text : "";
    input.placeholder = entry.example;
    input.dataset.numeric = entry.numeric ? "yes" : "";
    if (entry.numeric) input.inputMode = "decimal";
    part(form, "choices").append(...entry.choices.map((choice) => button(choice, () => set(choice))));
    const composition = mountComposition(part(form, "composition"));
    composition.show(entry);
    label.hidden = input.hidden = Boolean(entry.components);
    form.addEventListener("submit", (event) => { event.preventDefault(); set(composition.text() ?? input.value); });
    if (entry.field === "species") input.addEventListener("input", () => dispatch({ type: "find-species", text: input.value }));
    remove.addEventListener("click", () => set(""));
    remove.hidden = !entry.span;
    form.querySelector('[data-action="close"]').addEventListener("click", close);
    form.addEventListener("keydown", (event) => { if (event.key === "Escape") { event.stopPropagation(); close(); } });
    const note = part(form, "note").querySelector("input");
    note.addEventListener("change", () => dispatch({ type: "note", doubt: form.dataset.doubt, text: note.value }));
    note.value = doubt?.note ?? "";
    place();
    update(entry, doubt, null, []);
    const first = entry.components ? part(form, "composition").querySelector("input") : input;
    (doubt ? part(form, "readings").querySelector("button") ?? first : first).focus({ preventScroll: true });
    form.scrollIntoView({ block: "nearest" });
  }

  /** Behind the last piece that stands on the same row as the one it belongs to. */
  function place() {
    const piece = pieceOf(field);
    if (!piece) return;
    let last = piece;
    for (let next = piece.nextElementSibling; next; next = next.nextElementSibling) {
      if (next === form) continue;
      if (/** @type {any} */ (next).hidden || /** @type {any} */ (next).offsetTop !== piece.offsetTop) break;
      last = /** @type {any} */ (next);
    }
    if (last.nextElementSibling !== form) last.after(form);
  }

  function update(entry, doubt, problem, found) {
    const label = part(form, "label");
    say(label, doubt ? "Or write it into the text:" : entry.title);
    label.classList.toggle("hidden", !doubt);
    say(part(form, "help"), doubt ? `${doubt.question} ${doubt.changes}` : entry.help);
    form.dataset.doubt = doubt?.id ?? "";
    keyed(part(form, "readings"), doubt?.readings ?? [], (reading) => reading.id, (reading) => readingButton(doubt, reading, dispatch),
      (node, reading) => updateReading(node, doubt, reading));
    part(form, "note").hidden = !doubt;
    const shown = part(form, "problem"), input = part(form, "input");
    shown.hidden = !problem;
    shown.id = `${side}-edit-problem`;
    say(shown, problem ? `${problem.message} ${problem.hint}` : "");
    input.setAttribute("aria-invalid", String(Boolean(problem)));
    if (problem) input.setAttribute("aria-describedby", shown.id);
    else input.removeAttribute("aria-describedby");
    keyed(part(form, "found"), entry.field === "species" ? found.slice(0, SHOWN_SPECIES) : [], (species) => species.id,
      (species) => button(species.name, () => set(species.id)), () => {});
  }

  return (state) => {
    const open = state.editing?.side === side ? state.editing : null;
    const record = state.answer?.[side];
    const entry = open && (record?.pieces.find((piece) => piece.field === open.field) ?? record?.adds.find((add) => add.field === open.field));
    if (!entry) {
      form?.remove();
      form = null; field = "";
      if (open && record) queueMicrotask(() => dispatch({ type: "close" }));     // its piece is gone from the text
      return;
    }
    const doubt = state.answer.doubts.find((one) => one.id === entry.doubt);
    if (!form || field !== open.field) {
      form?.remove();
      field = open.field;
      build(entry, doubt);
    } else if (!form.contains(document.activeElement)) {
      place();
    }
    update(entry, doubt, open.problem, open.found ?? []);
  };
}
