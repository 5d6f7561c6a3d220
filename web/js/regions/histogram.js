/** The drawn figures as a histogram, with the budget's Gaussian over it and both intervals below. */
import { shape } from "../page.js";

const WIDTH = 400, HEIGHT = 150, FOOT = 110;

/** @param {HTMLElement} place @param {any} record */
export function drawHistogram(place, record) {
  const [low, high] = record.edges, span = high - low || 1;
  const most = Math.max(...record.counts, 1), step = WIDTH / record.counts.length;
  const x = (value) => (WIDTH * (value - low)) / span;
  const picture = shape("svg", { viewBox: `0 0 ${WIDTH} ${HEIGHT}`, class: "strip histogram", role: "img",
    "aria-label": `Histogram of ${record.trials} draws from ${record.low_text} to ${record.high_text} ${record.unit_text} in the 95 % interval` });
  record.counts.forEach((count, index) => {
    const height = (FOOT - 6) * count / most;
    picture.append(shape("rect", { x: index * step + 0.5, y: FOOT - height, width: step - 1, height }));
  });
  const points = record.curve.map((height, index) => `${(WIDTH * index / (record.curve.length - 1)).toFixed(1)},${(FOOT - (FOOT - 6) * height).toFixed(1)}`);
  picture.append(shape("polyline", { points: points.join(" ") }), shape("line", { x1: 0, x2: WIDTH, y1: FOOT, y2: FOOT }));
  for (const [from, to, y, label] of [[record.low, record.high, 124, "drawn"], [record.budget_low, record.budget_high, 142, "budget"]]) {
    picture.append(shape("line", { x1: x(from), x2: x(to), y1: y, y2: y }), shape("text", { x: 2, y: y + 4 }, label));
  }
  place.replaceChildren(picture);
}
