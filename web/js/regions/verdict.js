/** The figure at its limit: every decision rule until one is chosen, what was compared, and the display turned round. */
import { element, keyed, part, say } from "../page.js";
import { readingButton, updateReading } from "./readings.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountVerdict(root, dispatch) {
  const number = part(root, "number");
  number.addEventListener("change", () => dispatch({ type: "settle", doubt: "limit.decision_number", reading: number.value.trim() || null }));
  return (state) => {
    const verdict = state.answer?.verdict;
    root.hidden = !verdict;
    if (!verdict) return;
    say(part(root, "limit"), verdict.limit_text);
    say(part(root, "compared"), `${verdict.values_text} ${verdict.unit_text}${verdict.compared_on ? `, ${verdict.compared_on}` : ""}`);
    const doubt = { id: "limit.decision_rule", chosen: verdict.rule };
    part(root, "ask").hidden = Boolean(verdict.rule);
    const rules = verdict.rule ? verdict.rules.filter((rule) => rule.id === verdict.rule) : verdict.rules;
    const show = (place, some) => keyed(place, some, (rule) => rule.id, (rule) => readingButton(doubt, asReading(rule), dispatch),
      (node, rule) => updateReading(node, doubt, asReading(rule)));
    const lacking = verdict.rule ? [] : rules.filter((rule) => rule.problem), box = part(root, "more-rules");
    show(part(root, "rules"), rules.filter((rule) => !lacking.includes(rule)));
    box.hidden = !lacking.length;
    say(box.querySelector("summary"), lacking.length === 1 ? "1 rule that needs more" : `${lacking.length} rules that need more`);
    show(part(root, "lacking"), lacking);
    const needs = verdict.rule ? verdict.rules.find((rule) => rule.id === verdict.rule).needs : "";
    part(root, "number-box").hidden = !needs;
    say(part(root, "number-label"), needs);
    if (document.activeElement !== number) number.value = verdict.number;
    keyed(part(root, "choices"), verdict.choices, (choice) => choice.id, (choice) => choiceBox(choice, dispatch), (node, choice) => {
      node.querySelector("select").value = choice.chosen;
      say(node.querySelector("small"), choice.options.find((option) => option.id === choice.chosen).source);
    });
    keyed(part(root, "doubts"), verdict.doubts, (doubt) => doubt.id, () => element("div", "", "at-limit"), (node, doubt) => showDoubt(node, doubt, dispatch));
    say(part(root, "detail"), detail(verdict.decision));
    say(part(root, "turned"), turned(verdict.turned_round));
    const second = verdict.second;
    part(root, "second").hidden = !second;
    say(part(root, "second"), second ? `${second.limit_text}: ${second.values_text} ${second.unit_text} is ${second.sentence}. ${second.binding}` : "");
  };
}

/** An open doubt with the verdict under each reading. */
function showDoubt(node, doubt, dispatch) {
  if (!node.firstChild) node.append(element("p"), element("div", "", "readings"));
  say(node.firstElementChild, `${doubt.question}${doubt.decides ? " This decides." : ""}`);
  keyed(node.lastElementChild, doubt.readings, (reading) => reading.id, (reading) => readingButton(doubt, reading, dispatch),
    (button, reading) => updateReading(button, doubt, { ...reading, text: reading.words.join(" or ") }));
}

/** A named choice of the comparison: rounding, a result below detection, a negative value. */
function choiceBox(choice, dispatch) {
  const box = element("label", "", "note"), select = element("select");
  for (const option of choice.options) {
    const entry = element("option", option.title);
    entry.value = option.id;
    select.append(entry);
  }
  select.addEventListener("change", () => dispatch({ type: "settle", doubt: choice.id, reading: select.value }));
  box.append(element("span", `For the comparison, ${choice.title}:`), select, element("small", "", "quiet"));
  return box;
}

function asReading(rule) {
  return { id: rule.id, label: rule.title, source: rule.help, usual_because: "", text: rule.words.join(" or "), problem: rule.problem };
}

function detail(decision) {
  if (!decision?.rule) return "";
  return [`raw ${decision.raw_text}, counted as ${decision.counted_text}, compared ${decision.compared_text}`, decision.guard_text && `guard band ${decision.guard_text}`,
    decision.risk_text && `risk of a wrong acceptance at the guarded limit ${decision.risk_text}`,
    decision.probability_text && `probability of conformity ${decision.probability_text} ${decision.probability_note}`].filter(Boolean).join(" · ");
}

function turned(round) {
  if (!round) return "";
  const at = ["lower", "upper"].map((side) => round[`${side}_text`]).filter(Boolean).join(" and ");
  const guarded = round.guarded_text ? `; to stay below it with U, ${round.guarded_text} ${round.unit_text}` : "";
  return `Turned round: at the limit the held reading is ${at} ${round.unit_text}${guarded}.`;
}
