/** The uncertainty budget: a bar for each input's share, biggest first, and the table. */
import { cloned, keyed, part, say } from "../page.js";

/** @param {HTMLElement} root */
export function mountBudget(root) {
  return (state) => {
    const budget = state.answer?.uncertainty;
    root.hidden = !budget;
    if (!budget) return;
    const freedom = budget.freedom_text ? `, ${budget.freedom_text} degrees of freedom` : "";
    say(part(root, "sum"), `u = ${budget.standard_text} ${budget.unit_text}, k = ${budget.coverage_text}${freedom}, U = ${budget.expanded_text} ${budget.unit_text} (${budget.relative_text})`);
    const rows = budget.rows.map((row, index) => ({ ...row, key: `${row.field}${index}` }));
    keyed(part(root, "bars"), rows, (row) => row.key, () => /** @type {any} */ (cloned("step").firstElementChild), (node, row) => {
      say(node.firstElementChild, row.input);
      say(node.lastElementChild, row.share_text);
      node.querySelector("i").style.setProperty("--width", `${Math.max(0, Math.min(1, row.share)) * 100}%`);
    });
    keyed(part(root, "rows"), rows, (row) => row.key, () => document.createElement("tr"), (node, row) => {
      node.replaceChildren(...[row.input, row.value_text, row.standard_text, row.sensitivity_text, row.contribution_text, row.share_text].map((text) => {
        const cell = document.createElement("td");
        cell.textContent = text;
        return cell;
      }));
    });
  };
}
