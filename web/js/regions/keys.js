/**
 * Signs a phone's keyboard lacks, while something is being written: on a bar above the figure on a phone (it covers, it moves nothing),
 * in the head of the part on a wide screen. Arrow keys move along it.
 */
import { button } from "../page.js";

const KEYS = [["±", " ± "], ["×10ⁿ", "×10^"], ["−", "−"], ["<", "< "], ["µ", "µ"], ["³", "³"], ["°C", " °C"], ["%", " %"]];
const WRITTEN_IN = "textarea.said, .editor input[data-part='input']";

/** @param {HTMLElement} bar */
export function mountKeys(bar) {
  /** @type {HTMLTextAreaElement | HTMLInputElement | null} */
  let line = null;
  const letters = key("abc", () => {
    line.inputMode = line.inputMode === "decimal" ? "text" : "decimal";
    label();
    line.blur();                       // a keyboard on screen changes only when it opens
    line.focus();
  });
  bar.append(letters, ...KEYS.map(([name, sign]) => key(name, () => insert(sign))));
  letters.classList.add("letters");
  bar.addEventListener("keydown", (event) => {
    const step = { ArrowRight: 1, ArrowLeft: -1 }[event.key];
    if (event.key === "Escape") line?.focus();
    if (!step) return;
    const keys = visible();
    keys[(keys.indexOf(document.activeElement) + step + keys.length) % keys.length].focus();
  });
  document.addEventListener("focusin", ({ target }) => {
    if (!(target instanceof HTMLElement) || bar.contains(target)) return;
    line = target.matches(WRITTEN_IN) ? /** @type {any} */ (target) : null;
    bar.hidden = !line;
    if (!line) return;
    letters.hidden = !line.dataset.numeric;
    label();
    visible().forEach((node, index) => { node.tabIndex = index ? -1 : 0; });
    line.closest(".part").querySelector("header").append(bar);
  });
  document.addEventListener("focusout", ({ relatedTarget }) => { if (!relatedTarget) bar.hidden = true; });

  const visible = () => /** @type {any[]} */ ([...bar.children].filter((node) => !(/** @type {any} */ (node).hidden)));

  function label() {
    const decimal = line.inputMode === "decimal";
    letters.textContent = decimal ? "abc" : "123";
    letters.setAttribute("aria-label", decimal ? "keyboard with letters" : "keyboard with numbers");
  }

  function key(name, act) {
    const node = button(name, act, "key");
    node.addEventListener("pointerdown", (event) => event.preventDefault());   // the line keeps the caret
    return node;
  }

  function insert(sign) {
    line.setRangeText(sign, line.selectionStart, line.selectionEnd, "end");
    line.dispatchEvent(new Event("input", { bubbles: true }));
    line.focus();
  }
}
