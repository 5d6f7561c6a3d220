/** Wiring: state, core, regions. Intentions come in at `dispatch`; what they mean is decided here and nowhere else. */
import { createCore } from "./core-client.js";
import { keptActs } from "./acts/kept.js";
import { passingActs } from "./acts/passing.js";
import { recordActs } from "./acts/record.js";
import { holdOnTo, rowInHand, sheetInHand } from "./keeping.js";
import { codeIn } from "./link.js";
import { startOffline } from "./offline.js";
import { keepingFocus, part } from "./page.js";
import { mountAside } from "./regions/aside.js";
import { mountBudget } from "./regions/budget.js";
import { mountCompare } from "./regions/compare.js";
import { mountDoubts } from "./regions/doubts.js";
import { mountFigure } from "./regions/figure.js";
import { mountHelp } from "./regions/help.js";
import { mountKept } from "./regions/kept.js";
import { mountKeys } from "./regions/keys.js";
import { mountPanels } from "./regions/panels.js";
import { mountPassOn } from "./regions/pass-on.js";
import { mountReceive } from "./regions/receive.js";
import { mountRecord } from "./regions/record.js";
import { mountRuleBooks } from "./regions/rule-books.js";
import { mountSeries } from "./regions/series-door.js";
import { mountSide } from "./regions/side.js";
import { mountStatus } from "./regions/status.js";
import { mountSteps } from "./regions/steps.js";
import { mountExamples, mountTools } from "./regions/tools.js";
import { mountVary } from "./regions/vary.js";
import { mountVerdict } from "./regions/verdict.js";
import { mountWays } from "./regions/ways.js";
import { mountWorking } from "./regions/working.js";
import { createState, emptySheet, SIDES, WAYS, wanted } from "./state.js";
import { measureViewport } from "./viewport.js";

const RESTING_MS = 500;
const $ = (id) => document.getElementById(id);

const first = { ways: [], sheet: { ...emptySheet(), ...typedAlready(sheetInHand()) }, row: rowInHand(), pristine: null, answer: null, answeredFor: null, busy: false, editing: null, catalogue: null, sent: null, before: null, drawn: null, varied: null,
  notice: "", aside: null, panel: "", rows: null, rowsProblem: "", passed: null, received: null, record: null, amends: null, compared: null,
  core: { phase: "loading", stage: "waiting", done: 0, of: 0, version: "", message: "" }, offline: null };
const state = createState(first);
let mending = false, offline = null, resting = 0, ready = false, focusNext = null;
const core = createCore({ onState: (now) => { state.change({ core: now }); if (now.phase === "ready") onReady(); if (now.phase === "failed") mendCopy(); } });

/** What was typed before this script ran counts; where nothing was, what was kept. */
function typedAlready(kept) {
  const typed = Object.fromEntries(SIDES.map((side) => [side, $(`${side}-text`).value]));
  return Object.values(typed).some(Boolean) ? { ...kept, ...typed } : kept ?? {};
}

function onReady() {
  if (ready) return;
  ready = true;
  core.ask({ task: "catalogue" }).then((catalogue) => state.change({ catalogue }), (error) => state.change({ notice: error.message }));
  keepOffline();
  offline.booted();
}

function keepOffline() {
  offline ??= startOffline({ onState: onOffline, beforeReload: () => holdOnTo(state.get().sheet, state.get().row) });
}

/** A core that cannot start may have been given a damaged file of the kept copy: that is checked, mended, and the start tried once more. */
function mendCopy() {
  if (ready || mending) return;
  mending = true;
  keepOffline();
}

function onOffline(now) {
  state.change({ offline: now });
  if (now.phase !== "ready" || !mending || state.get().core.phase !== "failed") return;
  core.restart();
  restate();
}

function restate() {
  state.change({ busy: true });
  const { sheet } = state.get();
  const request = { task: "restate", sheet: { schema: 1, ...sheet }, sides: WAYS.filter((side) => wanted(state.get(), side)) };
  clearTimeout(resting);
  core.ask({ ...request, quick: true }, { channel: "restate" }).then(
    (answer) => {
      state.change({ answer, answeredFor: sheet, busy: false, sent: agreeing(answer) });
      if (focusNext && state.get().sheet === sheet) focusPiece(focusNext.side, focusNext.field);
      focusNext = null;
      if (answer.spread && !answer.spread.complete) resting = setTimeout(() => restateWhole(request, sheet), RESTING_MS);
    },
    (error) => {
      const kind = error.problem?.kind;
      if (kind === "superseded") return;
      // A core that is not there is told of by its own notice, which goes when it is back.
      state.change(kind === "unavailable" ? { busy: false } : { busy: false, notice: `${error.message} ${error.problem?.hint ?? ""}` });
    });
}

/** Every combination of readings, once the person rests. */
function restateWhole(request, sheet) {
  core.ask(request, { channel: "restate" }).then(
    (answer) => { if (state.get().sheet === sheet) state.change({ answer, sent: agreeing(answer) }); },
    (error) => { if (error.problem?.kind !== "superseded") state.change({ notice: error.message }); });
}

/** Whether this device arrives at the figure its sender saw. */
function agreeing(answer) {
  const { sent, sheet } = state.get();
  if (!sent || sent.sheet !== sheet) return null;
  return { ...sent, agrees: headline(answer) === sent.figure };
}

/** The figure in a few words. @param {any} answer */
function headline(answer) {
  if (answer.figure) return `${answer.figure.number_text} ${answer.figure.unit_text}`;
  const spread = answer.spread;
  return spread?.low ? `${spread.low.text} to ${spread.high.text} ${spread.unit_text}` : "";
}

/** The figure of the sheet that is on the page now; empty while it is not known. */
function figureNow() {
  const { answer, answeredFor, sheet } = state.get();
  return answer && answeredFor === sheet ? headline(answer) : "";
}

/** The figure with its species: what a sheet without a name is called. */
function figureNamed() {
  const { answer, answeredFor, sheet } = state.get(), species = answeredFor === sheet ? answer?.figure?.species_text ?? "" : "";
  return `${species} ${figureNow()}`.trim();
}

/** @param {object} sheet @param {object} [more] what changes with it */
function show(sheet, more = {}) {
  state.change({ sheet, ...more });
  holdOnTo(sheet, state.get().row);
  restate();
}

function changeSheet(patch) {
  show({ ...state.get().sheet, ...patch });            // the client keeps only the newest question, so a burst of keys is no burst of work
}

async function edit({ side, field, to }) {
  const { sheet, editing } = state.get();
  try {
    const { text } = await core.ask({ task: "edit", side, field, to, text: sheet[side] });
    focusPiece(side, field);
    state.change({ editing: null });
    focusNext = { side, field };       // a piece that is added or renamed stands only in the next answer
    changeSheet({ [side]: text });
  } catch (error) {
    state.change({ editing: { ...editing, problem: error.problem ?? { message: String(error), hint: "" } } });
  }
}

function focusPiece(side, field) {
  document.querySelector(`#${side} .piece[data-field="${CSS.escape(field)}"]`)?.focus({ preventScroll: true });
}

function settle({ doubt, reading }) {
  const { editing, sheet } = state.get(), settled = { ...sheet.settled };
  if (reading === null) delete settled[doubt];
  else settled[doubt] = reading;
  if (editing) focusPiece(editing.side, editing.field);
  state.change({ editing: null });
  changeSheet({ settled });
}

function takeUsual() {
  const open = state.get().answer.doubts.filter((doubt) => doubt.state === "open" && doubt.usual);
  changeSheet({ settled: { ...state.get().sheet.settled, ...Object.fromEntries(open.map((doubt) => [doubt.id, doubt.usual])) } });
}

async function findSpecies(text) {
  try {
    const { found } = await core.ask({ task: "search", what: "species", text }, { channel: "search" });
    const { editing } = state.get();
    if (editing?.field === "species") state.change({ editing: { ...editing, found } });
  } catch {
    // superseded, or nothing to search for: the list stays as it is
  }
}

async function draw({ trials }) {
  const { sheet } = state.get();
  state.change({ drawn: { sheet, busy: true, record: null } });
  try {
    const record = await core.ask({ task: "monte_carlo", sheet: { schema: 1, ...sheet }, ...(trials ? { trials } : {}) });
    state.change({ drawn: { sheet, busy: false, record } });
  } catch (error) {
    if (state.get().drawn) state.change({ drawn: null, notice: `${error.message} ${error.problem?.hint ?? ""}` });
  }
}

async function vary({ field, low, high }) {
  const { sheet } = state.get(), key = JSON.stringify([field, low, high, sheet]);
  try {
    state.change({ varied: { sheet, key, record: await core.ask({ task: "vary", sheet: { schema: 1, ...sheet }, field, low, high }, { channel: "vary" }) } });
  } catch (error) {
    state.change({ varied: { sheet, key, error: `${error.message} ${error.problem?.hint ?? ""}` } });
  }
}

const kept = keptActs({ state, core, headline: figureNamed, show });
const passing = passingActs({ state, core, headline: figureNow, restate, replace: kept.replace, dispatch: (intention) => dispatch(intention) });

/** A link in the address is opened once, and taken out of it. */
function openLink() {
  const code = codeIn(location.href);
  if (!code) return false;
  history.replaceState(null, "", location.pathname + location.search);
  passing.open(code);
  return true;
}

/** A word that offers nothing to undo goes with the next thing done. */
const lasting = (aside) => (aside?.actions.length ? aside : null);

function panel({ name }) {
  state.change({ panel: name, aside: lasting(state.get().aside), received: null, amends: null, ...(name === "record" ? {} : { record: null }), ...(name === "compare" ? {} : { compared: null }), ...(name === "pass-on" ? { passed: null } : {}) });
  if (name === "kept") kept.acts.kept();
}

const INTENTIONS = {
  text: ({ side, text }) => { state.change({ sent: null, aside: lasting(state.get().aside) }); changeSheet({ [side]: text }); },
  open: ({ side, field }) => {
    const now = state.get().editing;
    state.change({ editing: now?.side === side && now.field === field ? null : { side, field, problem: null, found: [] } });
  },
  close: () => state.change({ editing: null }),
  edit, settle, usual: takeUsual,
  way: ({ side }) => { state.change({ ways: [...state.get().ways, side] }); restate(); $(`${side}-text`).focus(); },
  "leave-way": ({ side }) => { state.change({ editing: null, ways: state.get().ways.filter((other) => other !== side) }); changeSheet({ [side]: "" }); },
  note: ({ doubt, text }) => changeSheet({ notes: { ...state.get().sheet.notes, [doubt]: text } }),
  "rule-book": ({ book }) => changeSheet({ owe: book.owe, rule_book: book.id }),
  "leave-rule-book": () => changeSheet({ rule_book: "" }),
  "find-species": ({ text }) => findSpecies(text),
  clear: () => { state.change({ ways: [] }); kept.replace(emptySheet(), { panel: "" }); $("hold-text").focus(); },
  example: ({ sheet }) => { const whole = { ...emptySheet(), ...sheet }; kept.replace(whole, { pristine: whole }); },
  panel, ...kept.acts, ...passing.acts, ...recordActs({ state, core }),
  notice: ({ text }) => state.change({ notice: text }),
  restart: () => { core.restart(); restate(); },
  draw, vary,
  "stop-drawing": () => { state.change({ drawn: null }); core.restart(); restate(); },
  update: () => offline?.takeUpdate(),
  later: () => offline?.later(),
};
const dispatch = (intention) => INTENTIONS[intention.type](intention);

const regions = [
  mountPanels(["pass-on", "kept", "receive", "record", "compare", "series"].map($), document.querySelector('.top [data-action="more"]'), dispatch),
  ...SIDES.map((side) => mountSide($(side), side, dispatch)), mountWays($("hold"), $, dispatch),
  mountRuleBooks($("owe"), dispatch), mountExamples($("examples"), dispatch), mountFigure($("figure"), $("spoken"), dispatch), mountDoubts($("doubts"), dispatch),
  mountVerdict($("verdict"), dispatch), mountSteps($("steps")), mountWorking($("working")), mountBudget($("budget"), dispatch), mountVary($("vary"), dispatch),
  mountStatus($("status"), part(document, "boot"), $("notice"), $("more"), dispatch), mountTools(document.querySelector(".top"), $("more"), dispatch),
  mountPassOn($("pass-on"), dispatch), mountKept($("kept"), dispatch, { proposed: figureNamed, file: kept.fileOf }), mountReceive($("receive"), dispatch),
  mountRecord($("record"), dispatch), mountCompare($("compare"), dispatch), mountSeries($("series")), mountAside($("aside"), dispatch),
  mountHelp(["hold", "gas", "owe", "limit", "doubts", "steps", "verdict", "working", "budget", "pass-on", "kept", "receive", "record", "compare"].map($)),
];
mountKeys($("keys"));
measureViewport($("figure"));
state.subscribe((now) => keepingFocus(() => { for (const region of regions) region(now); }));
if (!openLink()) restate();
addEventListener("hashchange", openLink);
