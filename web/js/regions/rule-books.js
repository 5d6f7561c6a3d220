/** The usual owed bases, found by typing, each with its clause; picking one writes its text, which stays editable. */
import { button, keyed } from "../page.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountRuleBooks(root, dispatch) {
  const box = document.createElement("details");
  const title = document.createElement("summary");
  title.textContent = "Bases by rule-book";
  const search = document.createElement("input");
  search.type = "search"; search.placeholder = "waste, gas turbine, workplace, natural gas"; search.className = "said";
  search.setAttribute("aria-label", "Search rule-books");
  const list = document.createElement("ul");
  const body = document.createElement("div");
  body.className = "books";
  body.append(search, list);
  box.append(title, body);
  root.append(box);
  let books = [];
  const show = () => {
    const words = search.value.toLowerCase().split(/\s+/).filter(Boolean);
    const found = books.filter((book) => words.every((word) => `${book.title} ${book.clause} ${book.owe} ${book.words}`.toLowerCase().includes(word)));
    keyed(list, found, (book) => book.id, (book) => entry(book), () => {});
  };
  search.addEventListener("input", show);

  function entry(book) {
    const item = document.createElement("li");
    const node = button("", () => { dispatch({ type: "rule-book", book }); box.open = false; }, "reading");
    const words = document.createElement("span"), name = document.createElement("b"), clause = document.createElement("span");
    name.textContent = book.title;
    clause.className = "quiet";
    clause.textContent = ` ${[book.clause, book.owe, book.read === "memory" ? "from memory, not from the document" : "", "check the current text"].filter(Boolean).join(" · ")}`;
    words.append(name, clause);
    node.append(words);
    item.append(node);
    return item;
  }

  return (state) => {
    box.hidden = !state.catalogue?.rule_books.length;
    if (state.catalogue && books !== state.catalogue.rule_books) { books = state.catalogue.rule_books; show(); }
  };
}
