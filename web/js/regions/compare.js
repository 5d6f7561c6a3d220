/** Two sheets side by side: only what differs, and which difference moved the figure by how much. */
import { clonedElement, element, part, say } from "../page.js";
import { mountPasteBox } from "./paste-box.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountCompare(root, dispatch) {
  const box = mountPasteBox(root, (text) => dispatch({ type: "compare", text })), before = root.querySelector('[data-action="compare-before"]'), result = part(root, "result");
  let shown = null, earlier = null;
  before.addEventListener("click", () => dispatch({ type: "compare", sheet: earlier }));
  root.querySelector('[data-action="to-kept"]').addEventListener("click", () => dispatch({ type: "panel", name: "kept" }));
  return (state) => {
    earlier = state.before?.sheet ?? null;
    before.hidden = !earlier;
    part(root, "stale").hidden = !shown?.mine || shown.mineSheet === state.sheet;
    if (state.compared === shown) return;
    shown = state.compared;
    if (shown?.problem) box.show(shown.problem);
    else box.clear();
    result.hidden = !shown?.mine;
    if (result.hidden) return;
    figure(part(root, "mine"), shown.mine);
    figure(part(root, "theirs"), shown.theirs);
    say(part(root, "theirs-name"), shown.theirsName ? `The other: ${shown.theirsName}` : "The other");
    say(part(root, "sentence"), shown.sentence);
    say(part(root, "together"), shown.together.factor_text && shown.differences.length ? `All together, from this one to the other: ${shown.together.factor_text}. ${shown.interplay_text}` : "");
    part(root, "list").replaceChildren(...shown.differences.map(difference));
    result.focus({ preventScroll: true });
    result.scrollIntoView({ block: "nearest" });
  };
}

function figure(node, { text, basis, verdict, problem }) {
  say(part(node, "value"), text);
  say(part(node, "basis"), [basis, problem].filter(Boolean).join(" "));
  say(part(node, "verdict"), verdict ? `Limit ${verdict}` : "");
}

function difference({ title, mine, theirs, alone, factor_text }) {
  const node = clonedElement("difference");
  say(node.querySelector("h3"), title);
  say(part(node, "one"), mine);
  say(part(node, "other"), theirs);
  const moved = part(node, "moved");
  if (factor_text) moved.append(element("b", factor_text), factor_text === "moves nothing" ? "" : ` alone: ${alone.text}`);
  else moved.append(alone.problem ? `Alone it gives no figure: ${alone.problem}` : `Alone: ${alone.text}, ${alone.basis}`);
  return node;
}
