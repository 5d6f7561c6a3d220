/** What is open, ranked; what was settled; what shows no effect. And every reading on one log line with its table. */
import { cloned, keyed, part, say } from "../page.js";
import { readingButton, updateReading } from "./readings.js";
import { drawStrip } from "./strip.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountDoubts(root, dispatch) {
  const show = (place, doubts) => keyed(place, doubts, (doubt) => doubt.id, (doubt) => make(doubt, dispatch), update);
  const list = part(root, "list"), box = part(root, "strip-box"), calmBox = part(root, "calm-box");
  return (state) => {
    const doubts = state.answer?.doubts ?? [];
    root.hidden = !doubts.length;
    show(list, doubts.filter((doubt) => doubt.state !== "calm"));
    const calm = doubts.filter((doubt) => doubt.state === "calm");
    calmBox.hidden = !calm.length;
    say(calmBox.querySelector("summary"), `${calm.length} more with no visible effect`);
    show(part(root, "calm"), calm);
    const spread = state.answer?.spread;
    const known = spread?.readings.filter((reading) => reading.value !== null) ?? [];
    box.hidden = known.length < 2;
    if (!box.hidden) drawStrip(part(root, "strip"), spread, known);
  };
}

function make(doubt, dispatch) {
  const node = /** @type {any} */ (cloned("doubt").firstElementChild);
  node.querySelector(".note input").addEventListener("change", (event) => dispatch({ type: "note", doubt: doubt.id, text: event.target.value }));
  node.dispatch = dispatch;
  return node;
}

const STATES = { open: "", settled: "settled", calm: "" };

function update(node, doubt) {
  node.dataset.state = doubt.state;
  say(node.querySelector("h3"), doubt.question);
  const effect = doubt.state === "open" && doubt.effect_text ? ` It moves the figure ${doubt.effect_text}.` : doubt.state === "calm" ? ` ${doubt.effect_text}` : "";
  say(part(node, "changes"), `${STATES[doubt.state] ? `${STATES[doubt.state]} · ` : ""}${doubt.changes}${effect}`);
  const readings = doubt.state === "settled" ? doubt.readings.filter((reading) => reading.id === doubt.chosen) : doubt.readings;
  keyed(node.querySelector(".readings"), readings, (reading) => reading.id,
    (reading) => readingButton(doubt, reading, node.dispatch), (button, reading) => updateReading(button, doubt, reading));
  const note = node.querySelector(".note");
  note.hidden = doubt.state !== "settled";
  const input = note.querySelector("input");
  if (document.activeElement !== input) input.value = doubt.note;
}
