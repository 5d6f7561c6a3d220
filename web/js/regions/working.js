/** Every step from held to owed, so that a checker can redo it by hand; drawn, and as text to copy. */
import { equation, placeEquation, symbol } from "../formula.js";
import { clonedElement, element, keyed, part, say } from "../page.js";

/** @param {HTMLElement} root */
export function mountWorking(root) {
  let shown = null, now = null;
  const copied = part(root, "copied");
  root.querySelector('[data-action="copy"]').addEventListener("click", async () => {
    const text = asText(now);
    try {
      await navigator.clipboard.writeText(text);
      say(copied, "Copied.");
    } catch {
      say(copied, "This browser does not let the page copy. Print it, or select it by hand.");
    }
  });
  return (state) => {
    const steps = state.answer?.working ?? [];
    now = state;
    root.hidden = !steps.length;
    if (shown === steps) return;
    shown = steps;
    say(copied, "");
    say(part(root, "count"), steps.length === 1 ? "1 step" : `${steps.length} steps`);
    // A step that says the same as before is left as it is drawn.
    keyed(part(root, "list"), steps.map((step) => ({ step, key: JSON.stringify(step) })), ({ key }) => key, ({ step }) => draw(step), () => {});
  };
}

function draw(step) {
  const node = clonedElement("work");
  say(node.querySelector(".number"), `${step.number}.`);
  say(node.querySelector("h3"), step.title);
  say(node.querySelector(".factor"), step.factor_text);
  const result = part(node, "result");
  if (step.formula) {
    placeEquation(part(node, "formula"), equation(step.result.symbol, step.formula, step.formula_text));
    placeEquation(part(node, "substitution"), equation(step.result.symbol, step.substitution, step.substitution_text));
    result.hidden = false;
    result.append("= ", step.result.text);
  } else {
    say(part(node, "substitution"), step.substitution_text);
  }
  node.querySelector("tbody").append(...step.inputs.map(input));
  say(part(node, "source"), [step.note, step.source_text].filter(Boolean).join(" · "));
  return node;
}

function input({ symbol: tree, meaning, text, origin_text }) {
  const row = element("tr"), letter = element("td"), words = element("td", meaning);
  letter.append(symbol(tree));
  words.append(element("small", origin_text));
  row.append(letter, words, element("td", text, "figures"));
  return row;
}

/** The whole sheet with its working as plain text, for a letter or a checker's file. */
function asText({ sheet, answer, core }) {
  const lines = [["You hold", sheet.hold], ["It was in", sheet.gas], ["You owe", sheet.owe], ["Limit", sheet.limit]].filter(([, text]) => text.trim()).map(([title, text]) => `${title}: ${text}`);
  for (const doubt of answer.doubts.filter((one) => one.state === "settled")) {
    const reading = doubt.readings.find((one) => one.id === doubt.chosen);
    lines.push(`Settled, ${doubt.side_title ?? doubt.side}, ${doubt.title}: ${reading?.label ?? doubt.chosen}${doubt.note ? ` (${doubt.note})` : ""}`);
  }
  if (answer.figure) lines.push(`Figure: ${answer.figure.text}`);
  for (const step of answer.working) {
    lines.push("", `${step.number}. ${step.title}  ${step.factor_text}`.trim());
    lines.push(...[step.formula_text, step.substitution_text, step.result && `= ${step.result.text}`].filter(Boolean).map((text) => `   ${text}`));
    lines.push(...step.inputs.map((one) => `   ${one.symbol.slice(1).filter(Boolean).join(" ")}: ${one.meaning}, ${one.text}, ${one.origin_text}`));
    const source = [step.note, step.source_text].filter(Boolean).join(" · ");
    if (source) lines.push(`   ${source}`);
  }
  return [...lines, "", `gasbasis ${core.version}`, ""].join("\n");
}
