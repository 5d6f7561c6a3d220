/** The buttons at the top: pass on, the panels, start anew, print, the look; and the invented examples while the sheet is empty. */
import { keepTheme, keptTheme } from "../keeping.js";
import { button, part } from "../page.js";
import { isEmpty } from "../state.js";

/** @param {HTMLElement} top @param {HTMLElement} more @param {(intention: object) => void} dispatch */
export function mountTools(top, more, dispatch) {
  const act = (root, name, what) => root.querySelector(`[data-action="${name}"]`).addEventListener("click", what);
  const toggle = top.querySelector('[data-action="more"]');
  const show = (open) => { more.hidden = !open; toggle.setAttribute("aria-expanded", String(open)); };
  act(top, "pass-on", () => { show(false); dispatch({ type: "panel", name: "pass-on" }); });
  act(top, "more", () => { if (more.hidden) dispatch({ type: "panel", name: "" }); show(more.hidden); });
  for (const opens of more.querySelectorAll("[data-panel]")) opens.addEventListener("click", () => { show(false); dispatch({ type: "panel", name: /** @type {any} */ (opens).dataset.panel }); });
  act(more, "clear", () => { show(false); dispatch({ type: "clear" }); });
  act(more, "print", () => print());
  more.querySelector('[data-action="print"]').hidden = !("print" in globalThis);
  more.addEventListener("keydown", (event) => { if (event.key === "Escape") { show(false); toggle.focus(); } });
  mountTheme(part(more, "theme"));
  const back = button("Back to the sheet before", () => { show(false); dispatch({ type: "back" }); });
  part(more, "back").append(back);
  return (state) => { back.hidden = !state.before; part(more, "back").hidden = !state.before; };
}

function mountTheme(choice) {
  choice.value = keptTheme();
  const show = () => { if (choice.value) document.documentElement.dataset.theme = choice.value; else delete document.documentElement.dataset.theme; };
  choice.addEventListener("change", () => { keepTheme(choice.value); show(); });
  show();
}

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountExamples(root, dispatch) {
  fetch(new URL("../../demo/sheets.json", import.meta.url)).then((reply) => reply.json()).then((demos) => {
    part(root, "demos").append(...demos.map((demo) => button(demo.title, () => dispatch({ type: "example", sheet: demo.sheet }))));
  }).catch(() => {});                  // no examples is no harm
  return ({ sheet }) => { root.hidden = !isEmpty(sheet); };
}
