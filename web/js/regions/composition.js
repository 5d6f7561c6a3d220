/** The components of a gas, a row each, in the editor of the gas piece; a free row at the end takes one more. */
import { element, say } from "../page.js";

/** @param {HTMLElement} place @returns {{show: (entry: any) => void, text: () => string | null}} */
export function mountComposition(place) {
  let byMass = false;

  function row(name = "", amount = "") {
    const node = element("div", "", "component");
    const species = element("input"), share = element("input");
    species.value = name;
    species.placeholder = "CH4";
    species.setAttribute("aria-label", "component");
    share.value = amount;
    share.placeholder = "%";
    share.inputMode = "decimal";
    share.setAttribute("aria-label", `share of ${name || "the new component"} in percent`);
    for (const input of [species, share]) Object.assign(input, { type: "text", autocomplete: "off", spellcheck: false, autocapitalize: "off" });
    species.addEventListener("input", () => {
      share.setAttribute("aria-label", `share of ${species.value.trim() || "the new component"} in percent`);
      if (node === place.querySelector(".component:last-of-type") && species.value.trim()) node.after(row());
    });
    node.append(species, share);
    return node;
  }

  const typed = () => [...place.querySelectorAll(".component")].map((node) => [...node.querySelectorAll("input")].map((input) => input.value.trim()));

  return {
    show(entry) {
      place.hidden = !entry.components;
      if (!entry.components) return place.replaceChildren();
      byMass = entry.by_mass;
      const total = element("p", "", "quiet");
      say(total, `In ${byMass ? "mass" : "mol"} percent; as typed they add up to ${entry.total_text} %${entry.whole ? "" : " and are brought to 100 %"}.`);
      place.replaceChildren(...entry.components.map(({ name, text }) => row(name, text)), row(), total);
    },
    /** The rows as the text line writes them; an emptied row is left out. */
    text() {
      if (place.hidden) return null;
      return `${byMass ? "by mass: " : ""}${typed().filter(([name, amount]) => name || amount).map((pair) => pair.join(" ")).join(", ")}`;
    },
  };
}
