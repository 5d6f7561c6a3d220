/** A short word on each part of the page, there when somebody asks: a sign behind its title. The words come from the core. */
import { button, element, say } from "../page.js";

/** @param {HTMLElement[]} roots parts and panels with a title; their ids name the words */
export function mountHelp(roots) {
  const places = roots.map((root) => {
    const title = root.querySelector("h2") ?? root.querySelector('[data-part="head"]'), words = element("p", "", "help quiet");
    const asks = button("?", () => { words.hidden = !words.hidden; asks.setAttribute("aria-expanded", String(!words.hidden)); }, "asks");
    words.id = `${root.id}-help`;
    words.hidden = true;
    asks.hidden = true;
    asks.setAttribute("aria-expanded", "false");
    asks.setAttribute("aria-controls", words.id);
    asks.setAttribute("aria-label", `Help: ${title.textContent}`);
    asks.addEventListener("keydown", (event) => { if (event.key === "Escape" && !words.hidden) { event.stopPropagation(); asks.click(); } });
    title.after(asks);
    title.parentElement.after(words);
    return { id: root.id, asks, words };
  });
  return ({ catalogue }) => {
    if (!catalogue) return;
    for (const { id, asks, words } of places) {
      asks.hidden = !catalogue.help[id];
      say(words, catalogue.help[id] ?? "");
    }
  };
}
