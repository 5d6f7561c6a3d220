/** One input over a range: the figure's curve with the limit and the crossings named, and the table beside it. */
import { element, keyed, part, say, shape } from "../page.js";

const WIDTH = 400, HEIGHT = 180, LEFT = 4, TOP = 14, FOOT = 150;

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountVary(root, dispatch) {
  const form = root.querySelector("form"), which = form.querySelector("select"), [low, high] = form.querySelectorAll("input");
  form.addEventListener("submit", (event) => { event.preventDefault(); dispatch({ type: "vary", field: which.value, low: low.value, high: high.value }); });
  return (state) => {
    const varies = state.answer?.varies ?? [];
    root.hidden = !varies.length;
    if (root.hidden) return;
    keyed(which, varies, (entry) => entry.field, (entry) => {
      const option = element("option");
      option.value = entry.field;
      return option;
    }, (option, entry) => say(option, `${entry.title}, now ${entry.text} ${entry.unit_text}`));
    const found = state.varied?.sheet === state.sheet ? state.varied : null;
    const problem = part(root, "problem"), shown = part(root, "shown");
    problem.hidden = !found?.error;
    say(problem, found?.error ?? "");
    shown.hidden = !found?.record;
    if (found?.record && shown.dataset.of !== found.key) {
      shown.dataset.of = found.key;
      show(root, found.record);
    }
  };
}

function show(root, record) {
  const limit = record.limit_texts.length ? ` The limit of ${record.limit_texts.join(" and ")} ${record.y_unit_text} is ${record.crossings.length
    ? `crossed at ${record.crossings.map((crossing) => crossing.text).join(" and ")}` : "not crossed"}.` : "";
  say(part(root, "words"), `The figure in ${record.y_unit_text} over the ${record.title} in ${record.x_unit_text || "1"}.${limit} ${record.left_out}`.trim());
  draw(part(root, "curve"), record);
  part(root, "rows").replaceChildren(...record.rows.map((row) => {
    const line = element("tr");
    line.append(element("td", row.x_text, "figures"), element("td", row.y_text || row.problem, "figures"));
    return line;
  }));
  say(part(root, "x-head"), `${record.title}, ${record.x_unit_text}`);
  say(part(root, "y-head"), `figure, ${record.y_unit_text}`);
}

function draw(place, record) {
  const known = record.y.filter((value) => value !== null);
  const picture = shape("svg", { viewBox: `0 0 ${WIDTH} ${HEIGHT}`, class: "strip curve", role: "img", "aria-label": `Curve of the figure over the ${record.title}; the table below has its points` });
  if (known.length) {
    const first = record.x[0], last = record.x.at(-1), least = Math.min(...known, ...record.limits), most = Math.max(...known, ...record.limits);
    const x = (value) => LEFT + ((WIDTH - 2 * LEFT) * (value - first)) / (last - first);
    const y = (value) => FOOT - ((FOOT - TOP) * (value - least)) / (most - least || 1);
    picture.append(shape("line", { x1: 0, x2: WIDTH, y1: FOOT + 4, y2: FOOT + 4 }));
    for (const run of runs(record)) picture.append(shape("polyline", { points: run.map(([a, b]) => `${x(a).toFixed(1)},${y(b).toFixed(1)}`).join(" ") }));
    record.limits.forEach((value, index) => picture.append(
      shape("line", { x1: 0, x2: WIDTH, y1: y(value), y2: y(value), class: "limit-line" }), shape("text", { x: 2, y: y(value) - 3 }, `limit ${record.limit_texts[index]}`)));
    for (const crossing of record.crossings) picture.append(shape("circle", { cx: x(crossing.x), cy: y(record.limits[0]), r: 4 }));
    if (record.here >= first && record.here <= last) picture.append(shape("line", { x1: x(record.here), x2: x(record.here), y1: TOP, y2: FOOT + 4, class: "here" }));
    picture.append(shape("text", { x: 2, y: HEIGHT - 12 }, record.rows[0].x_text), shape("text", { x: WIDTH - 2, y: HEIGHT - 12, "text-anchor": "end" }, record.rows.at(-1).x_text));
  }
  place.replaceChildren(picture);
}

/** The stretches of the curve between points that have no figure. */
function runs(record) {
  const found = [[]];
  record.y.forEach((value, index) => {
    if (value === null) found.push([]);
    else found.at(-1).push([record.x[index], value]);
  });
  return found.filter((run) => run.length);
}
