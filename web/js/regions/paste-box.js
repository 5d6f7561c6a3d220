/** A box for what somebody passed on: pasted, or chosen as a file. What it is, the core says. */
import { part, say } from "../page.js";

const LARGEST_FILE = 20_000_000;       // bytes; ten thousand kept sheets

/** @param {HTMLElement} root @param {(text: string) => void} take */
export function mountPasteBox(root, take) {
  const box = root.querySelector("textarea"), file = root.querySelector('input[type="file"]'), problem = part(root, "paste-problem");
  root.querySelector("form").addEventListener("submit", (event) => { event.preventDefault(); take(box.value); });
  box.addEventListener("paste", () => setTimeout(() => { if (box.value.trim()) take(box.value); }));      // a paste is meant to be opened
  file.addEventListener("change", async () => {
    const [chosen] = file.files;
    file.value = "";
    if (!chosen) return;
    if (chosen.size > LARGEST_FILE) { show({ message: `${chosen.name} is larger than any file of this page.`, hint: "Choose another." }); return; }
    try {
      take(await chosen.text());
    } catch {
      show({ message: `${chosen.name} could not be read.`, hint: "Choose it again." });
    }
  });

  function show(shown) {
    problem.hidden = !shown;
    say(problem, shown ? `${shown.message} ${shown.hint ?? ""}` : "");
    box.setAttribute("aria-invalid", String(Boolean(shown)));
  }
  return { show, clear() { box.value = ""; show(null); } };
}
