/** One side of the sheet: the text line, and its pieces as another view of it. */
import { cloned, clonedElement, element, keyed, part, say } from "../page.js";
import { mountEditor } from "./editor.js";

const NEXT = { hold: "gas-text", gas: "owe-text", owe: "limit-text", limit: "figure", sample: "gas-text", prepared: "gas-text", emission: "owe-text" };
const ABOUT = { hold: "what you hold", gas: "the gas", owe: "what you owe", limit: "the limit", sample: "the sample", prepared: "the prepared gas", emission: "the emission" };

/**
 * @param {HTMLElement} root @param {string} side @param {(intention: object) => void} dispatch
 * @returns {(state: any) => void}
 */
export function mountSide(root, side, dispatch) {
  const line = root.querySelector("textarea");
  line.after(cloned("side-parts"));
  const echo = part(root, "echo"), problems = part(root, "problems"), list = part(root, "pieces"), tray = part(root, "tray"), more = part(root, "more");
  problems.id = `${side}-problems`;
  tray.id = `${side}-tray`;
  line.setAttribute("aria-describedby", problems.id);
  line.addEventListener("input", () => { grow(line); dispatch({ type: "text", side, text: line.value }); });
  line.addEventListener("keydown", (event) => {
    if (event.key !== "Enter" || event.isComposing) return;
    event.preventDefault();
    document.getElementById(NEXT[side]).focus();
  });
  const words = element("span");
  more.append(words, element("span", ` about ${ABOUT[side]}`, "hidden"));
  more.setAttribute("aria-controls", tray.id);
  more.addEventListener("click", () => { tray.hidden = !tray.hidden; more.setAttribute("aria-expanded", String(!tray.hidden)); });
  const pieceOf = (field) => root.querySelector(`.piece[data-field="${CSS.escape(field)}"]`);
  const editor = mountEditor(side, dispatch, pieceOf);
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
      pieces(list, record.pieces, state, "piece");
      pieces(part(tray, "adds"), record.adds, state, "piece add");
      say(words, record.pieces.length ? "+ more" : "+ piece by piece");
      showAbout(part(root, "about"), record.about ?? []);
      more.hidden = !record.adds.length;
      if (more.hidden) tray.hidden = true;
    }
    editor(state);
  };

  function pieces(place, entries, state, className) {
    keyed(place, entries, (entry) => entry.field, (entry) => {
      const node = clonedElement("piece");
      node.className = className;
      if (className !== "piece") node.append(node.firstElementChild);       // what could be said first, the example below
      node.addEventListener("click", () => dispatch({ type: "open", side, field: entry.field }));
      return node;
    }, (node, entry) => {
      say(node.querySelector("small"), className === "piece" ? entry.title : `e.g. ${entry.example}`);
      say(node.querySelector("span"), className === "piece" ? entry.text : entry.title);
      node.querySelector("span").classList.toggle("figures", className === "piece");
      node.dataset.state = entry.state ?? "";
      node.dataset.field = entry.field;
      node.setAttribute("aria-expanded", String(state.editing?.side === side && state.editing.field === entry.field));
    });
  }
}

/** A line that is still empty is no error; only the gas may be left out, until something needs it. */
function waits(problem, side) {
  return problem.kind === "missing" && problem.field === side && side !== "gas";
}

function grow(line) {
  line.style.setProperty("height", "auto");
  const borders = line.offsetHeight - line.clientHeight;
  line.style.setProperty("height", `${line.scrollHeight + borders}px`);
}

function showProblems(list, problems) {
  keyed(list, problems, (problem) => problem.message, () => {
    const node = element("li");
    node.append(element("b"), element("span"));
    return node;
  }, (node, problem) => {
    node.dataset.kind = problem.kind;
    say(node.firstElementChild, problem.message);
    say(node.lastElementChild, problem.hint);
  });
}

/** What the gas line comes to: its water content, pressure, molar mass. */
function showAbout(list, rows) {
  list.hidden = !rows.length;
  keyed(list, rows, (row) => row.title, () => {
    const node = element("div");
    node.append(element("dt"), element("dd", "", "figures"));
    return node;
  }, (node, row) => {
    say(node.firstElementChild, row.title);
    say(node.lastElementChild, row.text);
  });
}

/** The text once more with the places marked that were not understood. */
function showEcho(echo, text, problems) {
  const spans = problems.map((problem) => problem.span).filter(Boolean).sort((a, b) => a[0] - b[0]);
  echo.hidden = !spans.length;
  echo.replaceChildren();
  if (!spans.length) return;
  const signs = [...text];             // places count characters, not UTF-16 units
  let place = 0;
  for (const [start, end] of spans) {
    if (start < place) continue;
    echo.append(signs.slice(place, start).join(""), element("mark", signs.slice(start, end).join("")));
    place = end;
  }
  echo.append(signs.slice(place).join(""));
}
