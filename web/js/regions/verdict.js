/** The figure at its limit: every decision rule until one is chosen, what was compared, and the display turned round. */
import { keyed, part, say } from "../page.js";
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
    say(part(root, "detail"), detail(verdict.decision));
    say(part(root, "turned"), turned(verdict.turned_round));
  };
}

function asReading(rule) {
  return { id: rule.id, label: rule.title, source: rule.help, usual_because: "", text: rule.words.join(" or "), problem: rule.problem };
}

function detail(decision) {
  if (!decision?.rule) return "";
  return [`raw ${decision.raw_text}, compared ${decision.compared_text}`, decision.guard_text && `guard band ${decision.guard_text}`,
    decision.risk_text && `risk of a wrong acceptance at the guarded limit ${decision.risk_text}`,
    decision.probability_text && `probability of conformity ${decision.probability_text} ${decision.probability_note}`].filter(Boolean).join(" · ");
}

function turned(round) {
  if (!round) return "";
  const at = ["lower", "upper"].map((side) => round[`${side}_text`]).filter(Boolean).join(" and ");
  const guarded = round.guarded_text ? `; to stay below it with U, ${round.guarded_text} ${round.unit_text}` : "";
  return `Turned round: at the limit the held reading is ${at} ${round.unit_text}${guarded}.`;
}
