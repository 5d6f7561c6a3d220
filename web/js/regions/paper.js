/** A record on paper: one A4 for a plain sheet. Every word comes from the record; the formulas are drawn where the page has them. */
import { equation, placeEquation } from "../formula.js";
import { linkOf } from "../link.js";
import { element } from "../page.js";
import { qrCode } from "./qr.js";

const COLUMNS = ["input", "value", "u", "sensitivity", "contribution", "share"];
const READ = { memory: "from memory, not from the document", secondary: "read in a copy", abstract: "abstract only" };

/** @param {HTMLElement} paper @param {any} record @param {any[]} working the steps with their formula trees */
export function drawPaper(paper, record, working) {
  paper.append(head(record), figure(record), typed(record), ...doubts(record), ...worth(record), ...steps(record, working), ...sources(record), ...notes(record), foot(record));
}

function block(title, ...children) {
  const node = element("section");
  node.append(element("h3", title), ...children.filter(Boolean));
  return node;
}

function rows(entries) {
  const list = element("dl");
  for (const [name, text, className] of entries.filter(([, said]) => said)) list.append(element("dt", name), element("dd", text, className));
  return list;
}

const joined = (...texts) => texts.filter(Boolean).join(", ");

function head({ sheet, made_at, made_by, app, amends, link_code }) {
  const node = element("header"), words = element("div"), code = link_code ? qrCode(linkOf(link_code)) : null;
  words.append(element("h2", sheet.title || "Record"), element("p", `Made ${made_at}${made_by ? ` by ${made_by}` : ""}`), element("p", `gasbasis ${app.version}, tables ${app.data.slice(0, 16)}`, "quiet"));
  if (amends) words.append(element("p", `Amends the record ${amends.checksum}: ${amends.why}`));
  node.append(words);
  if (code) node.append(code);
  return node;
}

function figure({ figure: found, spread, warnings, verdict, challenge }) {
  const node = element("section", "", "paper-figure");
  node.append(element("h3", challenge ? "What the clause could mean" : joined("Figure", found?.species_text)));
  node.append(element("p", found ? `${found.number_text} ${found.unit_text}` : spread.text, "value figures"));
  node.append(element("p", found ? found.basis : spread.depends));
  node.append(...warnings.map((text) => element("p", text)));
  if (!verdict) return node;
  node.append(element("p", `Limit ${verdict.limit_text}: ${verdict.sentence}`, "verdict-line"), element("p", [`Decision rule: ${verdict.rule}`, verdict.rule_means, verdict.rule_source].filter(Boolean).join(". ").replace("..", "."), "quiet"));
  const details = [["raw", verdict.raw_text], ["compared", verdict.compared_text], ["guard band", verdict.guard_text], ["typed with the rule", verdict.number],
    ["probability of conformity", verdict.probability_text && `${verdict.probability_text} ${verdict.probability_note}`], ["held reading at the limit", verdict.display_at_limit]];
  node.append(element("p", details.filter(([, text]) => text).map((pair) => pair.join(" ")).join(" · "), "quiet"));
  return node;
}

function typed({ texts, rule_book }) {
  const list = element("dl");
  for (const line of texts) {
    const words = element("dd");
    words.append(element("span", line.typed, "typed"), element("small", line.understood.map((piece) => `${piece.title} = ${piece.text}`).join("; ")));
    list.append(element("dt", line.title), words);
  }
  if (rule_book) list.append(element("dt", "Rule-book"), element("dd", joined(rule_book.title, rule_book.clause, READ[rule_book.read], rule_book.note)));
  return block("As typed, and as understood", list);
}

function doubts({ settled, left_open, no_visible_effect }) {
  const entries = [
    ...settled.map((one) => [`${one.side}, ${one.title}`, `${one.reading} (${one.usual_because ? `usual: ${one.usual_because}` : one.source})${one.note ? ` - ${one.note}` : ""}`]),
    ...left_open.map((one) => [`${one.side}, ${one.title}`, `left open${one.effect ? `, ${one.effect}` : ""}: ${one.readings.join("; ")}`]),
    ...no_visible_effect.map((one) => [`${one.side}, ${one.title}`, [one.effect, one.computed_as && `computed as ${one.computed_as}`].filter(Boolean).join("; ")]),
  ];
  return entries.length ? [block("Doubts", rows(entries))] : [];
}

function worth({ uncertainty }) {
  if (!uncertainty) return [];
  const { standard_text, unit_text, expanded_text, coverage_text, relative_text } = uncertainty, table = element("table", "", "stacks"), body = element("tbody"), top = element("tr");
  top.append(...COLUMNS.map((name) => { const cell = element("th", name); cell.scope = "col"; return cell; }));
  for (const row of uncertainty.rows) {
    const line = element("tr");
    line.append(...[row.input, row.value_text, `${row.standard_text} (${row.distribution})`, row.sensitivity_text, row.contribution_text, row.share_text].map((text, index) => {
      const cell = element("td", text);
      cell.dataset.label = COLUMNS[index];
      return cell;
    }));
    body.append(line);
  }
  const topped = element("thead");
  topped.append(top);
  table.append(topped, body);
  return [block("Uncertainty, JCGM 100:2008", element("p", `u = ${standard_text} ${unit_text}, U = ${expanded_text} ${unit_text} with k = ${coverage_text}${relative_text ? ` (${relative_text})` : ""}`), table)];
}

function steps({ working }, drawn) {
  if (!working.length) return [];
  const list = element("ol");
  for (const step of working) {
    const item = element("li"), tree = drawn.find((one) => one.number === step.number && one.formula && one.substitution_text === step.substitution_text);
    item.append(element("h4", [`${step.number}. ${step.title}`, step.factor_text].filter(Boolean).join("  ")));
    if (tree) item.append(formulas(formula(tree.result.symbol, tree.formula, step.formula_text), formula(tree.result.symbol, tree.substitution, step.substitution_text)));
    else item.append(...[step.formula_text, step.substitution_text].filter(Boolean).map((text) => element("p", text, "typed")));
    if (step.result) item.append(element("p", `= ${step.result.text}`, "result-line figures"));
    const inputs = step.inputs.map((one) => `${one.symbol}: ${one.meaning}, ${one.text}, ${one.origin}`).join("; ");
    if (inputs) item.append(element("p", inputs, "quiet"));
    const source = [step.note, step.source_text].filter(Boolean).join(" ");
    if (source) item.append(element("p", source, "quiet"));
    list.append(item);
  }
  return [block("Working", list)];
}

function formulas(...drawn) {
  const node = element("div", "", "formulas");
  node.append(...drawn);
  return node;
}

function formula(symbol, tree, text) {
  const node = element("div", "", "formula");
  placeEquation(node, equation(symbol, tree, text));
  return node;
}

function sources({ sources: used }) {
  if (!used.length) return [];
  const list = element("ul");
  list.append(...used.map((one) => element("li", joined(one.text, READ[one.read]))));
  return [block("Sources", list)];
}

function notes({ notes: text }) {
  return text ? [block("Notes", ...text.split(/\n+/).map((line) => element("p", line)))] : [];
}

function foot({ checksum, cautions, link_code }) {
  const node = element("footer");
  node.append(rows([["Checksum", checksum, "typed"], ["Code", link_code || "too long for a link; use the file", "typed"]]), element("p", cautions.join(" "), "quiet"));
  return node;
}
