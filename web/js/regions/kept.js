/** Kept sheets: this one by its name, the others found by typing. */
import { nameOf } from "../acts/kept.js";
import { handOverFile } from "../hand-over.js";
import { sameSheet } from "../kept-store.js";
import { button, element, keyed, part, say } from "../page.js";
import { isEmpty } from "../state.js";

const SHOWN = 30;                      // more only when asked for: a thousand rows stay quick

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch @param {{proposed: () => string, file: () => string}} page */
export function mountKept(root, dispatch, { proposed, file }) {
  const form = root.querySelector("form"), name = part(root, "name"), anew = root.querySelector('[data-action="keep-anew"]'), search = part(root, "search");
  const list = part(root, "list"), more = root.querySelector('[data-action="more-rows"]'), save = root.querySelector('[data-action="save-all"]');
  let rows = null, limit = SHOWN, open = "", namedFor = null, now = null;
  form.addEventListener("submit", (event) => { event.preventDefault(); dispatch({ type: "keep", title: name.value.trim() }); });
  anew.addEventListener("click", () => dispatch({ type: "keep", title: name.value.trim(), anew: true }));
  name.addEventListener("input", () => offer());
  search.addEventListener("input", () => { limit = SHOWN; find(); });
  more.addEventListener("click", () => { limit += SHOWN; find(); });
  save.addEventListener("click", async () => say(part(root, "told"), await handOverFile(file(), "kept-sheets.gasbasis.json", "application/json")));
  root.querySelector('[data-action="take-in"]').addEventListener("click", () => dispatch({ type: "panel", name: "receive" }));

  /** A sheet that is kept as it stands needs no button. */
  function offer() {
    const kept = now.rows?.find((row) => row.id === now.row?.id), same = Boolean(kept) && sameSheet(kept.sheet, { ...now.sheet, title: name.value.trim() });
    part(root, "keep-row").hidden = same;
    part(root, "kept-already").hidden = !same;
    anew.hidden = !kept;
    say(form.querySelector('[type="submit"]'), kept ? "Keep the changes" : "Keep this sheet");
  }

  function find() {
    const words = search.value.toLowerCase().split(/\s+/).filter(Boolean);
    const found = words.length ? rows.filter((row) => { const text = textOf(row); return words.every((word) => text.includes(word)); }) : rows;
    keyed(list, found.slice(0, limit), (row) => row.id, make, update);
    more.hidden = found.length <= limit;
    say(more, `${found.length - limit} more`);
    say(part(root, "count"), rows.length ? `${found.length === rows.length ? "" : `${found.length} of `}${rows.length} kept on this device` : "Nothing is kept yet.");
    part(root, "search-box").hidden = rows.length < 2;
    save.hidden = !rows.length;
  }

  function make(row) {
    const node = element("li"), opens = button("", () => dispatch({ type: "open-kept", row: node.row }), "row-opens"), about = button("…", () => { open = open === row.id ? "" : row.id; find(); }, "bare row-more");
    opens.append(element("b"), element("span", "", "typed quiet"), element("span", "", "quiet"));
    const acts = element("div", "", "row acts");
    acts.append(...[["Duplicate", "duplicate"], ["Compare with this one", "compare"], ["Delete", "delete-kept"]].map(([label, type]) =>
      button(label, () => { open = ""; dispatch({ type, row: node.row }); }, "plain")));
    node.append(opens, about, acts);
    return node;
  }

  function update(node, row) {
    node.row = row;
    const [title, held, rest] = node.firstElementChild.children, about = node.children[1];
    say(title, nameOf(row).slice(1, -1));
    say(held, [row.sheet.hold || row.sheet.sample || row.sheet.prepared || row.sheet.limit, row.sheet.owe].filter(Boolean).join(" → "));
    say(rest, [row.sheet.title ? row.figure : "", new Date(row.changed).toLocaleString([], { dateStyle: "medium", timeStyle: "short" }), now?.row?.id === row.id ? "on the page" : ""].filter(Boolean).join(" · "));
    about.setAttribute("aria-label", `More about ${nameOf(row)}`);
    about.setAttribute("aria-expanded", String(open === row.id));
    node.lastElementChild.hidden = open !== row.id;
  }

  return (state) => {
    now = state;
    const of = root.hidden ? null : state.row?.id ?? "";
    if (of !== null && of !== namedFor) name.value = state.sheet.title;
    name.placeholder = proposed();     // a sheet without a name is listed by its figure
    namedFor = of;
    if (root.hidden) { open = ""; return; }
    form.hidden = isEmpty(state.sheet);
    offer();
    say(part(root, "problem"), state.rowsProblem);
    part(root, "problem").hidden = !state.rowsProblem;
    if (!state.rows) return;
    rows = state.rows;
    find();
  };
}

const texts = new WeakMap();

/** All of a row that can be searched, made once. */
function textOf(row) {
  if (!texts.has(row)) texts.set(row, [...Object.values(row.sheet).filter((text) => typeof text === "string"), row.figure].join(" ").toLowerCase());
  return texts.get(row);
}
