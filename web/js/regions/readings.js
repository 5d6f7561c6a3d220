/** A reading of a doubt, as a button that settles it. */
import { clonedElement, say } from "../page.js";

/** @param {any} doubt @param {any} reading @param {(intention: object) => void} dispatch */
export function readingButton(doubt, reading, dispatch) {
  const node = clonedElement("reading");
  node.addEventListener("click", () => dispatch({ type: "settle", doubt: doubt.id, reading: node.dataset.chosen ? null : reading.id }));
  updateReading(node, doubt, reading);
  return node;
}

/** @param {any} node @param {any} doubt @param {any} reading */
export function updateReading(node, doubt, reading) {
  const chosen = doubt.chosen === reading.id;
  node.dataset.chosen = chosen ? "yes" : "";
  node.setAttribute("aria-pressed", String(chosen));
  say(node.querySelector("b"), reading.label);
  const why = reading.usual_because ? `usual: ${reading.usual_because}` : reading.source;
  say(node.querySelector(".quiet"), chosen ? `settled so; tap to open it again. ${why}` : why);
  const lacking = reading.text ? "" : reading.problem?.message ?? "";
  const figures = node.querySelector(".figures");
  figures.classList.toggle("lacking", Boolean(lacking));
  say(figures, lacking || reading.text);
}
