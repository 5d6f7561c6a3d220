/** What is open, ranked; what was settled; what shows no effect. And every reading on one log line with its table. */
import { clonedElement, keyed, part, say } from "../page.js";
import { readingButton, updateReading } from "./readings.js";
import { drawStrip, drawTable } from "./strip.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountDoubts(root, dispatch) {
  const show = (place, doubts) => keyed(place, doubts, (doubt) => doubt.id, (doubt) => make(doubt, dispatch), update);
  const list = part(root, "list"), calmBox = part(root, "calm-box"), stripBox = part(root, "strip-box");
  let drawn = null;
  return (state) => {
    const doubts = state.answer?.doubts ?? [];
    root.hidden = !doubts.length;
    if (root.hidden) return;
    const open = doubts.filter((doubt) => doubt.state === "open").length, settled = doubts.filter((doubt) => doubt.state === "settled").length;
    say(part(root, "count"), [open > 1 ? `${open} open, the one that matters most first` : open ? "1 open" : "", settled ? `${settled} settled` : ""].filter(Boolean).join(" · "));
    show(list, doubts.filter((doubt) => doubt.state !== "calm"));
    const calm = doubts.filter((doubt) => doubt.state === "calm");
    calmBox.hidden = !calm.length;
    say(calmBox.querySelector("summary"), `${calm.length} with no visible effect`);
    show(part(root, "calm"), calm);
    const spread = state.answer.spread, known = spread?.readings.filter((reading) => reading.value !== null) ?? [];
    stripBox.hidden = known.length < 2;
    if (stripBox.hidden || drawn === spread) return;
    drawn = spread;
    say(part(root, "strip-title"), spread.complete ? `${spread.counted} readings as a table` : `${spread.counted} of the readings as a table`);
    drawStrip(part(root, "strip"), spread, known);
    drawTable(part(root, "table"), spread, known);
  };
}

function make(doubt, dispatch) {
  const node = clonedElement("doubt");
  const heading = node.querySelector("h3");
  heading.id = `doubt-${doubt.id}`;
  node.setAttribute("aria-labelledby", heading.id);
  node.querySelector(".note input").addEventListener("change", (event) => dispatch({ type: "note", doubt: doubt.id, text: event.target.value }));
  node.querySelector('[data-action="unsettle"]').addEventListener("click", () => dispatch({ type: "settle", doubt: doubt.id, reading: null }));
  node.dispatch = dispatch;
  return node;
}

function update(node, doubt) {
  const settled = doubt.state === "settled";
  node.dataset.state = doubt.state;
  say(node.querySelector("h3 span"), settled ? doubt.title : doubt.question);
  say(part(node, "effect"), doubt.effect_text);
  say(part(node, "words"), doubt.changes);
  part(node, "changes").hidden = settled;
  keyed(node.querySelector(".readings"), settled ? [] : doubt.readings, (reading) => reading.id,
    (reading) => readingButton(doubt, reading, node.dispatch), (button, reading) => updateReading(button, doubt, reading));
  const chosen = settled && doubt.readings.find((reading) => reading.id === doubt.chosen), row = node.querySelector(".settled-row");
  row.hidden = !chosen;
  if (chosen) {
    say(row.querySelector("b"), chosen.label);
    say(row.querySelector(".quiet"), chosen.usual_because ? `usual: ${chosen.usual_because}` : chosen.source);
    row.querySelector("button").setAttribute("aria-label", `Un-settle ${doubt.title}`);
  }
  const note = node.querySelector(".note"), input = note.querySelector("input");
  note.hidden = !settled;
  if (document.activeElement !== input) input.value = doubt.note;
}
