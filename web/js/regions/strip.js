/** Every reading as a point on a logarithmic line, with the same numbers as a table. */
import { element, shape } from "../page.js";

const WIDTH = 400, HEIGHT = 62, EDGE = 8, LINE = 26, ROWS = 64;

/** @param {HTMLElement} place @param {any} spread @param {any[]} readings */
export function drawStrip(place, spread, readings) {
  const logarithmic = spread.low.value > 0;
  const scale = logarithmic ? Math.log10 : (value) => value;
  const low = scale(spread.low.value), span = scale(spread.high.value) - low || 1;
  const x = (value) => EDGE + (WIDTH - 2 * EDGE) * (value - low) / span;
  const picture = shape("svg", { viewBox: `0 0 ${WIDTH} ${HEIGHT}`, class: "strip", role: "img",
    "aria-label": `${readings.length} readings from ${spread.low.text} to ${spread.high.text} ${spread.unit_text}, on a ${logarithmic ? "logarithmic" : "plain"} line` });
  picture.append(shape("line", { x1: EDGE, x2: WIDTH - EDGE, y1: LINE, y2: LINE }));
  if (logarithmic && span > 1) {       // a tick for each power of ten
    for (let decade = Math.ceil(low); decade <= low + span; decade += 1) picture.append(shape("line", { class: "tick", x1: x(decade), x2: x(decade), y1: LINE - 12, y2: LINE + 12 }));
  }
  const places = new Set(readings.map((reading) => x(scale(reading.value)).toFixed(0)));       // points that would lie on one another are drawn once
  for (const at of places) picture.append(shape("circle", { cx: at, cy: LINE, r: 6 }));
  const words = `${spread.unit_text}`;
  picture.append(shape("text", { x: EDGE - 6, y: HEIGHT - 6 }, spread.low.text), shape("text", { x: WIDTH / 2, y: HEIGHT - 6, "text-anchor": "middle" }, words),
    shape("text", { x: WIDTH - EDGE + 6, y: HEIGHT - 6, "text-anchor": "end" }, spread.high.text));
  place.replaceChildren(picture);
}

/** @param {HTMLElement} place @param {any} spread @param {any[]} readings */
export function drawTable(place, spread, readings) {
  const table = /** @type {any} */ (element("table")), head = table.createTHead().insertRow();
  for (const [text, name] of [["reading", ""], [spread.unit_text, "figures"]]) {
    const cell = element("th", text, name);
    cell.scope = "col";
    head.append(cell);
  }
  const body = table.createTBody();
  for (const reading of readings.slice(0, ROWS)) body.insertRow().append(element("td", reading.label), element("td", reading.text, "figures"));
  if (readings.length > ROWS) body.insertRow().append(element("td", `and ${readings.length - ROWS} more between them`));
  place.replaceChildren(table);
}
