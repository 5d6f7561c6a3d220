/** One side of the sheet: the text line, and its pieces as another view of it. */
import { cloned, keyed, part, say } from "../page.js";
import { mountEditor } from "./editor.js";

/**
 * @param {HTMLElement} root @param {string} side @param {(intention: object) => void} dispatch
 * @returns {(state: any) => void}
 */
export function mountSide(root, side, dispatch) {
  const line = root.querySelector("textarea");
  root.append(cloned("side-parts"));
  const echo = part(root, "echo"), problems = part(root, "problems");
  problems.id = `${side}-problems`;
  line.setAttribute("aria-describedby", problems.id);
  line.addEventListener("input", () => { grow(line); dispatch({ type: "text", side, text: line.value }); });
  line.addEventListener("keydown", (event) => { if (event.key === "Enter") { event.preventDefault(); line.blur(); } });
  const editor = mountEditor(part(root, "editor"), side, dispatch);
  new ResizeObserver(() => grow(line)).observe(line);

  return (state) => {
    const text = state.sheet[side];
    if (line.value !== text) { line.value = text; grow(line); }
    const record = state.answer?.[side];
    const known = record && record.text === text;       // an answer to an older text is not shown as this one's
    const own = known ? state.answer.problems.filter((problem) => problem.field.split(".")[0] === side && !waits(problem, side)) : [];
    showProblems(problems, own);
    line.setAttribute("aria-invalid", String(own.some((problem) => problem.kind !== "missing")));
    showEcho(echo, text, own);
    if (record) {
      pieces(part(root, "pieces"), record.pieces, state, "piece", ({ title, text: shown }) => [title, shown]);
      pieces(part(root, "adds"), record.adds, state, "piece add", ({ title }) => ["", title]);
    }
    part(root, "adds-box").hidden = !record?.adds.length;
    editor(state);
  };

  function pieces(list, entries, state, className, words) {
    keyed(list, entries, (entry) => entry.field, (entry) => {
      const node = /** @type {any} */ (cloned("piece").firstElementChild);
      node.className = className;
      node.addEventListener("click", () => dispatch({ type: "open", side, field: entry.field }));
      return node;
    }, (node, entry) => {
      const [title, shown] = words(entry);
      say(node.querySelector("small"), title);
      node.querySelector("small").hidden = !title;
      say(node.querySelector("span"), shown);
      node.dataset.state = entry.state ?? "";
      node.dataset.field = entry.field;
      node.setAttribute("aria-expanded", String(state.editing?.side === side && state.editing.field === entry.field));
    });
  }
}

/** A line that is still empty is no error. */
function waits(problem, side) {
  return problem.kind === "missing" && problem.field === side;
}

function grow(line) {
  line.style.setProperty("height", "auto");
  const borders = line.offsetHeight - line.clientHeight;
  line.style.setProperty("height", `${line.scrollHeight + borders}px`);
}

function showProblems(list, problems) {
  keyed(list, problems, (problem) => problem.message, () => {
    const node = document.createElement("li");
    node.append(document.createElement("b"), document.createElement("span"));
    return node;
  }, (node, problem) => {
    node.dataset.kind = problem.kind;
    say(node.firstElementChild, problem.message);
    say(node.lastElementChild, problem.hint);
  });
}

/** The text once more with the places marked that were not understood. */
function showEcho(echo, text, problems) {
  const spans = problems.map((problem) => problem.span).filter(Boolean).sort((a, b) => a[0] - b[0]);
  echo.hidden = !spans.length;
  echo.replaceChildren();
  const signs = [...text];             // places count characters, not UTF-16 units
  let place = 0;
  for (const [start, end] of spans) {
    if (start < place) continue;
    const mark = document.createElement("mark");
    mark.textContent = signs.slice(start, end).join("");
    echo.append(signs.slice(place, start).join(""), mark);
    place = end;
  }
  echo.append(signs.slice(place).join(""));
}
