/** Every step from held to owed, so that a checker can redo it by hand. */
import { equation } from "../formula.js";
import { cloned, part, say } from "../page.js";

/** @param {HTMLElement} root */
export function mountWorking(root) {
  let shown = null;
  return (state) => {
    const steps = state.answer?.working ?? [];
    root.hidden = !steps.length;
    if (shown === steps) return;
    shown = steps;
    say(part(root, "count"), steps.length === 1 ? "1 step" : `${steps.length} steps`);
    part(root, "list").replaceChildren(...steps.map(draw));
  };
}

function draw(step) {
  const node = /** @type {any} */ (cloned("work").firstElementChild);
  say(node.querySelector("h3"), `${step.number}. ${step.title}${step.factor_text ? `  ${step.factor_text}` : ""}`);
  if (step.formula) {
    part(node, "formula").append(equation(step.result.symbol, step.formula, step.formula_text));
    part(node, "substitution").append(equation(step.result.symbol, step.substitution, step.substitution_text));
    say(part(node, "result"), `= ${step.result.text}`);
  } else {
    say(part(node, "substitution"), step.substitution_text);
  }
  node.querySelector(".inputs").append(...step.inputs.map(input));
  say(part(node, "source"), [step.note, step.source_text].filter(Boolean).join(" · "));
  return node;
}

function input({ symbol, meaning, text, origin_text }) {
  const node = document.createElement("li");
  const letter = symbol[2] ? `${symbol[1]} ${symbol[2]}` : symbol[1];
  node.textContent = `${letter}: ${meaning}, ${text}, ${origin_text}`;
  return node;
}
