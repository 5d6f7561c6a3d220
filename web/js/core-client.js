/**
 * The page's side of the worker: questions in, answers out, and a worker that is replaced when it dies.
 *
 * @typedef {{phase: "loading"|"ready"|"failed", stage: string, done: number, of: number, version: string, message: string}} CoreState
 * @typedef {{kind: string, field: string, message: string, hint: string, span: [number, number] | null, detail?: string}} CoreProblem
 * @typedef {{id: number, request: string, channel: string, tries: number, timer: number,
 *            resolve: (answer: object) => void, reject: (problem: CoreError) => void}} Question
 */

import { makeWorker } from "./worker-source.js";

const SILENCE_AT_START_MS = 30_000;    // no word from a starting worker for so long: it is given up
const LONGEST_ANSWER_MS = 60_000;      // no single answer may take longer
const TRIES = 2;                       // a question that kills Python twice is not asked a third time
const RESTARTS_WITHOUT_ANSWER = 3;

/** What went wrong with a question. `problem.kind`: as the core says it, or "superseded", "unavailable", "too_long". */
export class CoreError extends Error {
  /** @param {CoreProblem} problem */
  constructor(problem) {
    super(problem.message);
    this.problem = problem;
  }
}

/** @param {string} kind @param {string} message @param {string} hint */
function problem(kind, message, hint = "") {
  return new CoreError({ kind, field: "", message, hint, span: null });
}

/**
 * @param {{onState?: (state: CoreState) => void}} options
 * @returns {{ask: (request: object, options?: {channel?: string}) => Promise<object>, state: CoreState, restart: () => void}}
 */
export function createCore({ onState = () => {} } = {}) {
  /** @type {CoreState} */
  let state = { phase: "loading", stage: "waiting", done: 0, of: 0, version: "", message: "" };
  /** @type {Worker | null} */
  let worker = null;
  let watchdog = 0;
  let lastId = 0;
  let restarts = 0;
  /** Questions with the worker, or waiting for it to be ready. @type {Map<number, Question>} */
  const pending = new Map();
  /** The question behind the one with the worker, one a channel: only the newest is worth asking. @type {Map<string, Question>} */
  const next = new Map();

  function change(patch) {
    state = { ...state, ...patch };
    onState(state);
  }

  function ask(request, { channel = "" } = {}) {
    return new Promise((resolve, reject) => {
      const question = { id: ++lastId, request: JSON.stringify(request), channel, tries: 0, timer: 0, resolve, reject };
      if (state.phase === "failed") {
        reject(problem("unavailable", state.message, "Your inputs are kept. Try again."));
        return;
      }
      const inHand = channel ? [...pending.values()].find((other) => other.channel === channel) : undefined;
      if (!inHand) {
        send(question);
        return;
      }
      next.get(channel)?.reject(problem("superseded", "A newer question took its place."));
      next.set(channel, question);
    });
  }

  function send(question) {
    pending.set(question.id, question);
    if (state.phase !== "ready") return;
    question.tries += 1;
    question.timer = setTimeout(() => tooLong(question), LONGEST_ANSWER_MS);
    worker.postMessage({ id: question.id, request: question.request });
  }

  function settle(question) {
    clearTimeout(question.timer);
    pending.delete(question.id);
    const following = next.get(question.channel);
    if (!following) return false;
    next.delete(question.channel);
    send(following);
    return true;
  }

  function receive({ id, answer }) {
    const question = pending.get(id);
    if (!question) return;
    restarts = 0;
    if (settle(question)) {
      question.reject(problem("superseded", "A newer question took its place."));
      return;
    }
    const envelope = JSON.parse(answer);
    if (envelope.ok) question.resolve(envelope.answer);
    else question.reject(new CoreError(envelope.error));
  }

  function onMessage({ data }) {
    if (data.type === "progress") {
      if (state.phase === "loading") watch();
      change({ stage: data.stage, done: data.done, of: data.of });
    } else if (data.type === "ready") {
      clearTimeout(watchdog);
      state = { ...state, phase: "ready", version: data.version, stage: "ready", message: "" };
      for (const question of [...pending.values()]) send(question);      // before onState, which may ask more
      onState(state);
    } else if (data.type === "failed") {
      if (state.phase === "ready") replace(data.message);
      else giveUp(data.message);
    } else {
      receive(data);
    }
  }

  function tooLong(question) {
    question.tries = TRIES;
    replace("An answer took too long and was stopped.", "too_long");
  }

  /** End a dead worker, start another, and ask again what was open. */
  function replace(message, kind = "unavailable") {
    end();
    restarts += 1;
    for (const question of [...pending.values()]) {
      clearTimeout(question.timer);
      if (question.tries >= TRIES) {
        pending.delete(question.id);
        question.reject(problem(kind, message, "Your inputs are kept. Change one and try again."));
      }
    }
    for (const [channel, question] of [...next]) {
      if ([...pending.values()].some((other) => other.channel === channel)) continue;
      next.delete(channel);
      pending.set(question.id, question);
    }
    if (restarts > RESTARTS_WITHOUT_ANSWER) giveUp(message);
    else start();
  }

  function giveUp(message) {
    end();
    change({ phase: "failed", stage: "failed", message });
    const open = [...pending.values(), ...next.values()];
    pending.clear();
    next.clear();
    for (const question of open) {
      clearTimeout(question.timer);
      question.reject(problem("unavailable", message, "Your inputs are kept. Try again."));
    }
  }

  function end() {
    clearTimeout(watchdog);
    worker?.terminate();
    worker = null;
  }

  function watch() {
    clearTimeout(watchdog);
    watchdog = setTimeout(() => giveUp("Python gave no sign of life for 30 seconds: the connection may be slow or cut."),
      SILENCE_AT_START_MS);
  }

  function start() {
    if (typeof WebAssembly === "undefined" || typeof Worker === "undefined") {
      giveUp("This browser has WebAssembly switched off, so the core cannot run. Lockdown or enhanced-security modes "
        + "do that; allow this site in the browser's settings.");
      return;
    }
    change({ phase: "loading", stage: "waiting", done: 0, of: 0, message: "" });
    worker = makeWorker();
    worker.onmessage = onMessage;
    worker.onerror = (event) => (state.phase === "ready" ? replace : giveUp)(event.message || "The worker could not be loaded.");
    worker.onmessageerror = () => replace("A message from Python could not be read.");
    watch();
    worker.postMessage({ type: "start", counted: !navigator.serviceWorker?.controller });
  }

  function restart() {
    end();
    restarts = 0;
    start();
  }

  start();
  return { ask, restart, get state() { return state; } };
}
