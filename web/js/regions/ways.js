/** How the number came about: a chooser beside what is held, and the parts it adds. Who only restates sees one button of it. */
import { button, element, part, say } from "../page.js";
import { WAYS, wanted } from "../state.js";

const CHOICES = {
  sample: ["A collected sample", "mass found, meter, blank, recovery, paired trains"],
  prepared: ["A prepared gas", "cylinder and flows, permeation, mercury vapour"],
  emission: ["A rate is owed", "kg/h, lb/MMBtu, g/kWh: by flow, duct or fuel"],
};
const GIVES_WHAT_IS_HELD = ["sample", "prepared"];

/** @param {HTMLElement} root the part on what is held @param {(side: string) => HTMLElement} sectionOf @param {(intention: object) => void} dispatch */
export function mountWays(root, sectionOf, dispatch) {
  const opens = button("how it came about", () => show(box.hidden), "piece opens"), box = element("div", "", "ways");
  const line = root.querySelector("textarea"), head = part(root, "head");
  const headThen = head.textContent;
  box.id = "ways";
  box.hidden = true;
  opens.setAttribute("aria-expanded", "false");
  opens.setAttribute("aria-controls", box.id);
  part(root, "pieces").append(opens);
  root.append(box);
  const choices = new Map(WAYS.map((side) => {
    const [title, of] = CHOICES[side], node = button("", () => { show(false); dispatch({ type: "way", side }); }, "reading");
    const words = element("span");
    words.append(element("b", title), " ", element("span", of, "quiet"));
    node.append(words);
    box.append(node);
    part(sectionOf(side), "pieces").append(button("Take it out", () => { dispatch({ type: "leave-way", side }); opens.focus(); }, "bare"));
    return [side, node];
  }));
  box.addEventListener("keydown", (event) => { if (event.key === "Escape") { show(false); opens.focus(); } });

  function show(open) {
    box.hidden = !open;
    opens.setAttribute("aria-expanded", String(open));
  }

  return (state) => {
    for (const side of WAYS) {
      const here = wanted(state, side);
      sectionOf(side).hidden = !here;
      choices.get(side).hidden = here;
    }
    opens.hidden = WAYS.every((side) => wanted(state, side));
    const given = GIVES_WHAT_IS_HELD.find((side) => wanted(state, side));
    root.classList.toggle("by-way", Boolean(given) && !state.sheet.hold.trim());
    line.hidden = root.classList.contains("by-way");
    say(head, line.hidden ? `by the ${given === "sample" ? "sample" : "prepared gas"} below` : headThen);
  };
}
