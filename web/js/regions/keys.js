/** Signs a phone's keypad lacks, on a bar above the figure while a line is being written. It covers, it moves nothing. */
import { button } from "../page.js";

const KEYS = [["±", " ± "], ["×10ⁿ", "×10^"], ["−", "−"], ["<", "< "], ["µ", "µ"], ["³", "³"], ["°C", " °C"], ["%", " %"]];

/** @param {HTMLElement} bar @param {HTMLElement} figure */
export function mountKeys(bar, figure) {
  /** @type {HTMLTextAreaElement | null} */
  let line = null;
  for (const [label, sign] of KEYS) {
    const key = button(label, () => insert(sign), "key");
    key.addEventListener("pointerdown", (event) => event.preventDefault());   // the line keeps the caret
    bar.append(key);
  }
  document.addEventListener("focusin", ({ target }) => {
    if (target instanceof Element && bar.contains(target)) return;
    line = target instanceof HTMLTextAreaElement ? target : null;
    bar.hidden = !line;
  });
  document.addEventListener("focusout", ({ relatedTarget }) => {
    if (!relatedTarget) bar.hidden = true;
  });
  new ResizeObserver(() => bar.style.setProperty("--bar", `${figure.offsetHeight}px`)).observe(figure);

  function insert(sign) {
    if (!line) return;
    line.setRangeText(sign, line.selectionStart, line.selectionEnd, "end");
    line.dispatchEvent(new Event("input", { bubbles: true }));
    line.focus();
  }
}
