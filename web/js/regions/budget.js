/** The uncertainty budget: a bar for each input's share, biggest first, and the table. */
import { clonedElement, element, keyed, part, say } from "../page.js";
import { drawHistogram } from "./histogram.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountBudget(root, dispatch) {
  const draw = root.querySelector('[data-action="draw"]'), stop = root.querySelector('[data-action="stop"]'), progress = part(root, "progress");
  const titles = [...root.querySelectorAll("thead th")].map((head) => head.textContent);
  const more = root.querySelector('[data-action="draw-on"]');
  draw.addEventListener("click", () => dispatch({ type: "draw" }));
  more.addEventListener("click", () => dispatch({ type: "draw", trials: Number(more.value) }));
  stop.addEventListener("click", () => dispatch({ type: "stop-drawing" }));
  return (state) => {
    const budget = state.answer?.uncertainty;
    root.hidden = !budget;
    if (!budget) return;
    const drawing = state.drawn?.sheet === state.sheet ? state.drawn : null;
    draw.hidden = Boolean(drawing?.busy);
    more.hidden = Boolean(drawing?.busy) || drawing?.record?.agrees !== null;
    stop.hidden = progress.hidden = !drawing?.busy;
    progress.value = state.core.stage === "drawing" && state.core.of ? state.core.done / state.core.of : 0;
    more.value = drawing?.record?.most ?? "";
    showDrawn(root, drawing?.record);
    const freedom = budget.freedom_text ? `, ${budget.freedom_text} degrees of freedom` : "";
    say(part(root, "sum"), `u = ${budget.standard_text} ${budget.unit_text}, k = ${budget.coverage_text}${freedom}, U = ${budget.expanded_text} ${budget.unit_text} (${budget.relative_text})`);
    const rows = budget.rows.map((row, index) => ({ ...row, key: `${row.field}${index}` }));
    keyed(part(root, "bars"), rows, (row) => row.key, () => clonedElement("step"), (node, row) => {
      say(node.firstElementChild, row.input);
      say(node.lastElementChild, row.share_text);
      node.querySelector("i").style.setProperty("--width", `${Math.max(0, Math.min(1, row.share)) * 100}%`);
    });
    keyed(part(root, "rows"), rows, (row) => row.key, () => element("tr"), (node, row) => {
      const texts = [row.input, row.value_text, row.standard_text, row.sensitivity_text, row.contribution_text, row.share_text];
      node.replaceChildren(...texts.map((text, column) => {
        const cell = element("td", text, column ? "figures" : "");
        cell.dataset.label = titles[column];
        return cell;
      }));
    });
  };
}

function showDrawn(root, record) {
  part(root, "drawn").hidden = !record;
  if (!record) return;
  const verdict = record.agrees === null ? "Too few draws yet to confirm the budget's interval or not"
    : record.agrees ? "The budget's interval is confirmed" : "The budget's interval is not confirmed: the drawn one counts";
  say(part(root, "drawn-text"), `${verdict} (JCGM 101:2008, clause 8). ${record.trials} draws: mean ${record.mean_text} ${record.unit_text}, `
    + `shortest 95 % interval ${record.low_text} to ${record.high_text}; by the budget ${record.budget_low_text} to ${record.budget_high_text}.`
    + `${record.outside ? ` ${record.outside} draws outside what is possible were left out.` : ""}`);
  drawHistogram(part(root, "histogram"), record);
}
