/** The usual owed bases, found by typing, each with its clause; picking one writes its text, which stays editable. */
import { button, element, keyed, part, say } from "../page.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountRuleBooks(root, dispatch) {
  const opens = button("by rule-book", () => show(body.hidden), "piece opens");
  const body = element("div", "", "books"), search = element("input", "", "said"), list = element("ul"), none = element("p", "None of the rule-books here has all these words.", "quiet");
  const inForce = element("div", "", "in-force"), words = element("p");
  body.id = "rule-books";
  body.hidden = true;
  opens.setAttribute("aria-expanded", "false");
  opens.setAttribute("aria-controls", body.id);
  search.type = "search"; search.placeholder = "waste, gas turbine, workplace, natural gas"; search.autocomplete = "off";
  search.setAttribute("aria-label", "Search rule-books");
  body.append(search, list, none);
  inForce.append(words, button("Leave it", () => { dispatch({ type: "leave-rule-book" }); opens.focus(); }, "bare"));
  part(root, "pieces").append(opens);
  root.append(inForce, body);
  let books = [];

  function show(open) {
    body.hidden = !open;
    opens.setAttribute("aria-expanded", String(open));
    if (!open) return;
    search.focus({ preventScroll: true });
    body.scrollIntoView({ block: "start" });
  }

  function find() {
    const asked = search.value.toLowerCase().split(/\s+/).filter(Boolean);
    const found = books.filter((book) => asked.every((word) => `${book.title} ${book.clause} ${book.owe} ${book.words}`.toLowerCase().includes(word)));
    none.hidden = found.length > 0;
    keyed(list, found, (book) => book.id, entry, () => {});
  }
  search.addEventListener("input", find);
  body.addEventListener("keydown", (event) => { if (event.key === "Escape") { show(false); opens.focus(); } });

  function entry(book) {
    const item = element("li");
    const node = button("", () => { dispatch({ type: "rule-book", book }); show(false); opens.focus(); }, "reading");
    const said = element("span");
    said.append(element("b", book.title), element("span", book.owe, "typed quiet"), element("span", [book.clause, memory(book), book.note].filter(Boolean).join(" · "), "quiet"));
    node.append(said);
    item.append(node);
    return item;
  }

  return (state) => {
    opens.hidden = !state.catalogue?.rule_books.length;
    if (state.catalogue && books !== state.catalogue.rule_books) { books = state.catalogue.rule_books; find(); }
    const taken = state.sheet.rule_book && books.find((book) => book.id === state.sheet.rule_book);
    inForce.hidden = !taken;
    say(words, taken ? `By ${taken.title}: ${[taken.clause, memory(taken), taken.note].filter(Boolean).join(" · ")}` : "");
  };
}

const memory = (book) => (book.read === "memory" ? "from memory, not from the document" : "");
