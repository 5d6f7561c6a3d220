/** What each correction did: a bar a step on a log axis. */
import { clonedElement, keyed, part, say } from "../page.js";

/** @param {HTMLElement} root */
export function mountSteps(root) {
  return (state) => {
    const steps = state.answer?.steps ?? [];
    root.hidden = !steps.length;
    keyed(part(root, "list"), steps.map((step, index) => ({ ...step, key: `${index}` })), (step) => step.key,
      () => clonedElement("step"), (node, step) => {
        say(node.firstElementChild, step.label);
        say(node.lastElementChild, step.factor_text);
        const bar = node.querySelector("i");
        bar.style.setProperty("--width", `${Math.abs(step.log_share) * 50}%`);
        bar.toggleAttribute("data-down", step.log_share < 0);
      });
  };
}
