/** Every reading as a point on a logarithmic line, with the same numbers as a table. */
import { shape } from "../page.js";

const WIDTH = 400, HEIGHT = 64, EDGE = 30, LINE = 30;

/** @param {HTMLElement} place @param {any} spread @param {any[]} readings */
export function drawStrip(place, spread, readings) {
  const logarithmic = spread.low.value > 0;
  const scale = logarithmic ? Math.log : (value) => value;
  const low = scale(spread.low.value), span = scale(spread.high.value) - low || 1;
  const picture = shape("svg", { viewBox: `0 0 ${WIDTH} ${HEIGHT}`, class: "strip", role: "img",
    "aria-label": `${readings.length} readings from ${spread.low.text} to ${spread.high.text} ${spread.unit_text}` });
  picture.append(shape("line", { x1: EDGE, x2: WIDTH - EDGE, y1: LINE, y2: LINE }));
  for (const reading of readings) {
    picture.append(shape("circle", { cx: EDGE + (WIDTH - 2 * EDGE) * (scale(reading.value) - low) / span, cy: LINE, r: 5 }));
  }
  picture.append(shape("text", { x: EDGE, y: HEIGHT - 8, "text-anchor": "middle" }, spread.low.text),
    shape("text", { x: WIDTH - EDGE, y: HEIGHT - 8, "text-anchor": "middle" }, spread.high.text));
  place.replaceChildren(picture, table(readings, spread.unit_text));
}

function table(readings, unit) {
  const node = document.createElement("table");
  const head = node.createTHead().insertRow();
  for (const [text, name] of [["reading", ""], [unit, "figures"]]) {
    const cell = document.createElement("th");
    cell.scope = "col"; cell.textContent = text; cell.className = name;
    head.append(cell);
  }
  const body = node.createTBody();
  for (const reading of readings.slice(0, 64)) {
    const row = body.insertRow();
    row.insertCell().textContent = reading.label;
    const cell = row.insertCell();
    cell.textContent = reading.text; cell.className = "figures";
  }
  if (readings.length > 64) body.insertRow().insertCell().textContent = `and ${readings.length - 64} more between them`;
  return node;
}
