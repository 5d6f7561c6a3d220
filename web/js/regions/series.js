/**
 * The series panel: open or paste a logger's file, see what was understood, say what the columns are, restate, read the means.
 * It has a worker of its own, so that the sheet stays alive and a long run can be stopped by ending it.
 */
import { button, element } from "../page.js";
import { makeWorker } from "../worker-source.js";
import { mountSeriesResults } from "./series-results.js";

const WINDOWS = ["1 min", "10 min", "30 min", "60 min", "day"];

/** @param {HTMLElement} root */
export function openSeries(root) {
  const room = root.querySelector('[data-part="room"]');
  const box = Object.fromEntries(["file", "understood", "columns", "settings", "run", "results"].map((name) => {
    const node = element("div", "", `series-${name}`);
    room.append(node);
    return [name, node];
  }));
  const results = mountSeriesResults(box.results, { workbook: () => run(true) });
  let worker = null, lastId = 0, waiting = new Map(), file = null, seen = null, roles = {}, settings = null, said = {}, started = 0, posted = null;

  // --- the worker ---

  function summon() {
    if (worker) return worker;
    let ready;
    const promise = new Promise((resolve, reject) => { ready = { resolve, reject }; });
    const raw = makeWorker();
    raw.onmessage = ({ data }) => {
      if (data.type === "ready") ready.resolve(raw);
      else if (data.type === "failed") { const error = new Error(data.message); ready.reject(error); for (const { reject } of waiting.values()) reject(error); forget(); }
      else if (data.type === "series-progress") progress(data.done, data.of);
      else if (data.type === "series-answer") { waiting.get(data.id)?.resolve(data); waiting.delete(data.id); }
    };
    raw.onerror = (event) => ready.reject(new Error(event.message || "The worker could not be loaded."));
    raw.postMessage({ type: "start", counted: false });
    worker = { raw, ready: promise };
    posted = null;
    return worker;
  }

  function forget() {
    worker?.raw.terminate();
    worker = null;
    waiting = new Map();
  }

  /** @param {object} request @param {{book?: boolean, zones?: boolean}} [needs] */
  async function ask(request, needs = {}) {
    const summoned = summon(), raw = await summoned.ready;
    const id = ++lastId;
    const message = { type: "series", id, request, ...needs, ...(posted === file ? {} : { file }) };
    posted = file;
    const data = await new Promise((resolve, reject) => { waiting.set(id, { resolve, reject }); raw.postMessage(message); });
    const envelope = JSON.parse(data.answer);
    if (!envelope.ok) throw Object.assign(new Error(envelope.error.message), { problem: envelope.error });
    return { ...envelope.answer, columnsDrawn: data.columns, files: data.files };
  }

  // --- the file ---

  function drawFile() {
    const chosen = element("input");
    chosen.type = "file";
    chosen.addEventListener("change", () => chosen.files[0] && open(chosen.files[0]));
    const label = element("label", "A file of readings (CSV, TSV) ", "note");
    label.append(chosen);
    const pasted = element("textarea", "", "series-paste");
    pasted.rows = 2;
    pasted.spellcheck = false;
    const pasteLabel = element("label", "or paste its rows, the header with them", "note");
    pasteLabel.append(pasted);
    box.file.replaceChildren(label, pasteLabel, row(
      button("Read what was pasted", () => pasted.value.trim() && open(new File([pasted.value], "pasted.csv"))),
      button("Look at an invented day", demo)));
  }

  async function demo() {
    const [text, given] = await Promise.all([fetch(new URL("../../demo/logger_day.csv", import.meta.url)).then((reply) => reply.blob()),
      fetch(new URL("../../demo/logger_day.json", import.meta.url)).then((reply) => reply.json())]);
    await open(new File([text], "logger_day.csv"), given);
  }

  async function open(newFile, given = null) {
    [file, seen, settings, said] = [newFile, null, given, given ? { ...given.file } : {}];
    results.clear();
    for (const name of ["columns", "settings", "run"]) box[name].replaceChildren();
    await look();
  }

  async function look() {
    working(box.understood, "Reading the file …");
    try {
      seen = await ask({ task: "look", said });
      roles = Object.fromEntries(seen.columns.map((column) => [column.name, column.role]));
      settings ??= await ask({ task: "propose", said, roles });
      drawUnderstood();
      drawColumns();
      drawSettings();
    } catch (error) {
      box.understood.replaceChildren(problem(error));
    }
  }

  function drawUnderstood() {
    const list = element("ul", "", "quiet");
    list.append(...seen.understood.map((text) => element("li", text)));
    const questions = seen.questions.map((question) => {
      const part = element("div", "", "series-question");
      part.append(element("p", question.question), row(...question.readings.map((reading) => button(reading.label, () => {
        said[question.id.split(".")[1]] = reading.id;
        const [top, name] = question.id.split(".");
        settings[top] = { ...settings[top], [name]: reading.id };
        look();
      }))));
      return part;
    });
    box.understood.replaceChildren(element("h3", `What was understood of ${file.name}`), list, ...questions);
  }

  function drawColumns() {
    const table = element("table", "", "series-table");
    const head = element("tr");
    head.append(...["column", "unit", "for example", "is"].map((text) => element("th", text)));
    table.append(head, ...seen.columns.map((column) => {
      const line = element("tr");
      const choice = select(Object.fromEntries(seen.roles.map((role) => [role.id, role.label])), roles[column.name], (value) => { roles[column.name] = value; });
      choice.setAttribute("aria-label", `What ${column.name} is`);
      choice.disabled = ["time", "date", "clock", "empty"].includes(column.kind);
      const cells = [element("td", column.name), element("td", column.unit), element("td", [column.example, ...column.texts.filter((text) => text !== column.example).slice(0, 3)].join(", "), "figures"), element("td")];
      if (choice.disabled) cells[3].textContent = { time: "time stamps", date: "dates", clock: "times of day", empty: "empty" }[column.kind];
      else cells[3].append(choice);
      line.append(...cells);
      return line;
    }));
    const details = element("details");
    details.append(element("summary", `${seen.columns.length} columns: what each of them is`), scrolled(table), row(button("Write the texts anew from these", async () => {
      settings = { ...(await ask({ task: "propose", said, roles })), time: settings.time, means: settings.means };
      delete settings.columnsDrawn;
      delete settings.files;
      drawSettings();
    })));
    box.columns.replaceChildren(details);
  }

  // --- settings ---

  function drawSettings() {
    for (const name of ["columnsDrawn", "files"]) delete settings[name];
    const species = settings.species.map((entry, place) => {
      const part = element("fieldset");
      part.append(element("legend", entry.name),
        field("You hold", entry.hold, (text) => { entry.hold = text; }, "NOx {NOx} ppm dry as NO2"),
        field("You owe", entry.owe, (text) => { entry.owe = text; }, "mg/m3 at 0 °C, 101.3 kPa, dry, 3 % O2"),
        field("Limit", entry.limit ?? "", (text) => { entry.limit = text; }, "200 mg/m3"),
        ...(settings.species.length > 1 ? [button("Leave it out", () => { settings.species.splice(place, 1); drawSettings(); }, "bare")] : []));
      return part;
    });
    const time = settings.time ??= {}, means = settings.means ??= { windows: [] }, choices = seen.choices;
    const set = (where, name) => (value) => { if (value === "" || value === null) delete where[name]; else where[name] = value; };
    const settled = Object.entries(settings.settled ?? {});
    box.settings.replaceChildren(element("h3", "What you hold, what you owe"),
      element("p", "The same texts as on a sheet; a column's name in braces stands where its number would be.", "quiet"), ...species,
      field("It was in, for all of them", settings.gas ?? "", set(settings, "gas"), "{H2O} % H2O, {O2} % O2 dry, ambient O2 20.9 %"),
      ...(settled.length ? [row(element("span", `Settled: ${settled.map(([doubt, reading]) => `${doubt} is ${reading}`).join(", ")}`), button("Un-settle", () => { delete settings.settled; drawSettings(); }, "bare"))] : []),
      tick("Take the usual reading of a doubt where there is one", settings.usual === true, (on) => { settings.usual = on; }),
      ...(settings.status ? [field(`Words of ${settings.status.column} that mean a valid reading`, settings.status.valid.join(", "), (text) => { settings.status.valid = text.split(",").map((word) => word.trim()); })] : []),
      ...(settings.flow ? [field(`Basis of ${settings.flow.column}`, settings.flow.basis, (text) => { settings.flow.basis = text; }, "0 °C, 101.3 kPa, dry"), tick("Weight the means by it", settings.flow.weighs === true, (on) => { settings.flow.weighs = on; }),
        button(`Leave ${settings.flow.column} out`, () => { delete settings.flow; drawSettings(); }, "bare")] : []),
      element("h3", "Means"), windowsField(means),
      row(chosen("Which is owed", choices.order, means.order, set(means, "order")), chosen("A stamp is", choices.stamp, time.stamp, set(time, "stamp"))),
      row(chosen("“<” readings", choices.below, settings.below, set(settings, "below")), chosen("Negative readings", choices.negatives, settings.negatives ?? "keep", set(settings, "negatives"))),
      row(field("Data a mean needs, in % of its time", means.capture_percent ?? "", number(means, "capture_percent"), "none"), field("Time zone, if the clock is changed", time.zone ?? "", set(time, "zone"), "Europe/Vienna"),
        chosen("Decision rule for the limit", choices.rules, settings.limit?.rule, (rule) => { if (rule) settings.limit = { ...settings.limit, rule }; else delete settings.limit; })));
    drawRun();
  }

  function windowsField(means) {
    const part = element("div", "", "row");
    part.append(...WINDOWS.map((window) => tick(window, means.windows.includes(window), (on) => {
      means.windows = on ? [...means.windows, window] : means.windows.filter((other) => other !== window);
    })), field("others, parted by ;", means.windows.filter((window) => !WINDOWS.includes(window)).join("; "), (text) => {
      means.windows = [...means.windows.filter((window) => WINDOWS.includes(window)), ...text.split(";").map((word) => word.trim()).filter(Boolean)];
    }, "rolling 60 min every 10 min"));
    return part;
  }

  const number = (where, name) => (text) => {
    const value = Number(text.replace(",", "."));
    if (text.trim() === "") delete where[name]; else where[name] = Number.isFinite(value) ? value : text;
  };

  // --- running ---

  const bar = element("progress"), left = element("span", "", "quiet"), stop = button("Stop", () => { forget(); box.run.querySelector("progress").hidden = true; stop.hidden = true; left.textContent = "Stopped. Nothing was written."; });
  bar.setAttribute("aria-label", "Restating");
  left.setAttribute("role", "status");

  function drawRun() {
    bar.hidden = stop.hidden = true;
    left.textContent = "";
    box.run.replaceChildren(row(button("Restate the series", () => run(false), "plain strong"), stop, bar, left), element("div", "", "series-problem"));
  }

  function progress(done, of) {
    bar.max = of;
    bar.value = done;
    const seconds = (performance.now() - started) / 1000 * (of - done) / Math.max(done, 1);
    left.textContent = `${Math.floor(100 * done / of)} %, ${seconds < 1.5 ? "a second" : seconds < 90 ? `${Math.ceil(seconds)} s` : `${Math.ceil(seconds / 60)} min`} left`;
  }

  async function run(book) {
    const place = box.run.querySelector(".series-problem");
    place.replaceChildren();
    bar.removeAttribute("value");
    bar.hidden = stop.hidden = false;
    left.textContent = "starting";
    started = performance.now();
    try {
      const found = await ask({ task: "run", settings: { ...settings, file: { ...settings.file, ...fileSaid() } } }, { book, zones: Boolean(settings.time?.zone) });
      left.textContent = `done in ${((performance.now() - started) / 1000).toFixed(1)} s`;
      results.show(found, settings, file.name);
    } catch (error) {
      left.textContent = "";
      place.replaceChildren(problem(error));
    }
    bar.hidden = stop.hidden = true;
  }

  const fileSaid = () => Object.fromEntries(Object.entries(said).filter(([name]) => ["encoding", "delimiter", "decimal"].includes(name)));

  function problem(error) {
    const part = element("div", "", "problem"), { hint = "", readings = [], field: doubt = "" } = error.problem ?? {};
    part.setAttribute("role", "alert");
    part.append(element("p", error.message), element("p", hint));
    if (readings.length) part.append(row(...readings.map((reading) => button(reading.label, () => {
      settings.settled = { ...settings.settled, [doubt]: reading.id };
      drawSettings();
      run(false);
    }))));
    return part;
  }

  drawFile();
  summon();
}

function working(node, text) { node.replaceChildren(element("p", text, "quiet")); }

function row(...nodes) {
  const part = element("div", "", "row");
  part.append(...nodes);
  return part;
}

function scrolled(table) {
  const part = element("div", "", "series-scroll");
  part.tabIndex = 0;
  part.append(table);
  return part;
}

function field(name, value, change, example = "") {
  const label = element("label", `${name} `, "note"), input = element("input");
  Object.assign(input, { type: "text", value, placeholder: example, autocomplete: "off", spellcheck: false });
  input.addEventListener("input", () => change(input.value));
  label.append(input);
  return label;
}

function select(options, value, change) {
  const node = element("select");
  node.append(...Object.entries(options).map(([id, label]) => new Option(label, id, false, id === value)));
  node.addEventListener("change", () => change(node.value));
  return node;
}

function chosen(name, options, value, change) {
  const label = element("label", `${name} `, "choice");
  label.append(select({ ...(value ? {} : { "": "not chosen" }), ...options }, value ?? "", change));
  return label;
}

function tick(name, on, change) {
  const label = element("label", "", "tick series-tick"), input = element("input");
  Object.assign(input, { type: "checkbox", checked: on });
  input.addEventListener("change", () => change(input.checked));
  label.append(input, element("span", name));
  return label;
}
