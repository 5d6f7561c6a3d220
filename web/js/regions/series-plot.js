/** A series drawn: figures, means, the limit, what lies above it. However many points there are, a screen's width of extremes is drawn. */
import uPlot from "../../libraries/uplot.js";

const PER_PIXEL = 1;
const PAN_STEP = 0.2;
// From which step of the axis on, how its marks are written, and what is written below where the year, the day or the minute changes.
const DAY = "\n{YYYY}-{MM}-{DD}";
const CLOCK = [[86400 * 28, "{YYYY}-{MM}", null, null, null, null, null, null, 1], [86400, "{MM}-{DD}", "\n{YYYY}", null, null, null, null, null, 1],
  [60, "{HH}:{mm}", DAY, null, DAY, null, null, null, 1], [1, "{HH}:{mm}:{ss}", DAY, null, DAY, null, null, null, 1]];

/** The smallest and largest of each stretch between two places, in their order; a break where stamps lie more than `gap` apart. @param {Float64Array} x @param {Float64Array} y */
export function extremes(x, y, from, until, pieces, gap = Infinity) {
  const xs = [], ys = [];
  let last = x[from];
  const step = Math.max(1, Math.ceil((until - from) / pieces));
  for (let start = from, end; start < until; start = end) {
    end = Math.min(until, start + step);
    let low = -1, high = -1;
    for (let place = start; place < end; place += 1) {
      if (place > start && x[place] - x[place - 1] > gap) { end = place; break; }
      const value = y[place];
      if (value !== value) continue;
      if (low < 0 || value < y[low]) low = place;
      if (high < 0 || value > y[high]) high = place;
    }
    if (low < 0) { xs.push(x[start]); ys.push(null); continue; }
    if (x[start] - last > gap) { xs.push((x[start] + last) / 2); ys.push(null); }
    last = x[end - 1];
    for (const place of low === high ? [low] : low < high ? [low, high] : [high, low]) { xs.push(x[place]); ys.push(y[place]); }
  }
  return [xs, ys];
}

/** The first place at or behind a time. @param {Float64Array} x */
function placeOf(x, time) {
  let low = 0, high = x.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (x[middle] < time) low = middle + 1; else high = middle;
  }
  return low;
}

/**
 * @param {HTMLElement} box
 * @param {{times: Float64Array, figures: Float64Array, means: {start: number, end: number, value: number | null}[], limit: number | null, title: string}} series
 */
export function drawSeries(box, { times, figures, means, limit, title }) {
  box.replaceChildren();
  if (!times.length) return null;
  const style = getComputedStyle(box), colour = (name) => style.getPropertyValue(name).trim();
  const whole = [times[0], times[times.length - 1]];
  const steps = Array.from(times.subarray(1, 1000), (time, place) => time - times[place]).sort((one, other) => one - other);
  const gap = 3 * (steps[steps.length >> 1] ?? Infinity);       // three usual intervals without a row
  const points = () => Math.max(100, Math.round(box.clientWidth * PER_PIXEL));

  function data(from, to) {
    const [rowX, rowY] = extremes(times, figures, Math.max(0, placeOf(times, from) - 1), Math.min(times.length, placeOf(times, to) + 1), points(), gap);
    const steps = [];
    for (const mean of means) {
      if (mean.value === null || mean.end < from || mean.start > to) continue;
      if (steps.length && mean.start > steps[steps.length - 1][0] + 0.002) steps.push([mean.start - 0.001, null]);
      steps.push([mean.start, mean.value], [mean.end - 0.001, mean.value]);
    }
    const thin = steps.length > 4 * points() ? [] : steps;
    return uPlot.join([[rowX, rowY], [thin.map(([x]) => x), thin.map(([, y]) => y)], [[from, to], [limit, limit]]]);
  }

  const chart = new uPlot({
    width: box.clientWidth || 320, height: Math.min(360, Math.max(220, (box.clientWidth || 320) * 0.5)), title,
    tzDate: (seconds) => uPlot.tzDate(new Date(seconds * 1000), "Etc/UTC"),
    legend: { show: false }, cursor: { drag: { x: true, y: false } },
    scales: { x: { time: true } },
    series: [{}, { label: "rows", stroke: colour("--quiet"), width: 1, spanGaps: false, points: { show: false } },
      { label: "means", stroke: colour("--accent"), width: 2.5, spanGaps: false, points: { show: false } },
      { label: "limit", stroke: colour("--wrong"), width: 2, dash: [8, 5], spanGaps: true, points: { show: false } }],
    axes: [{ space: 80, values: CLOCK, stroke: colour("--ink"), grid: { stroke: colour("--ruled"), width: 1 } }, { stroke: colour("--ink"), grid: { stroke: colour("--ruled"), width: 1 } }],
    hooks: { setSelect: [(plot) => { if (plot.select.width > 4) show(plot.posToVal(plot.select.left, "x"), plot.posToVal(plot.select.left + plot.select.width, "x")); plot.setSelect({ left: 0, width: 0, top: 0, height: 0 }, false); }] },
  }, data(...whole), box);
  let [from, to] = whole;

  function show(first, last) {
    const least = Math.max(1e-6, (whole[1] - whole[0]) / times.length * 5), width = Math.min(whole[1] - whole[0], Math.max(least, last - first));
    from = Math.min(Math.max(whole[0], first), whole[1] - width);
    to = from + width;
    chart.batch(() => { chart.setData(data(from, to), false); chart.setScale("x", { min: from, max: to }); });
  }

  const zoom = (by, around = (from + to) / 2) => show(around - (around - from) * by, around + (to - around) * by);
  const pan = (share) => show(from + (to - from) * share, to + (to - from) * share);
  box.onkeydown = (event) => {
    const act = { ArrowLeft: () => pan(-PAN_STEP), ArrowRight: () => pan(PAN_STEP), "+": () => zoom(0.5), "-": () => zoom(2), Home: () => show(...whole) }[event.key];
    if (!act) return;
    event.preventDefault();
    act();
  };
  touch(chart.over, chart, zoom, pan);
  return { zoom, pan, whole: () => show(...whole), get range() { return [from, to]; } };
}

/** Two fingers zoom, one finger sideways pans; the page still scrolls up and down. */
function touch(over, chart, zoom, pan) {
  const fingers = new Map();
  over.addEventListener("pointerdown", (event) => { if (event.pointerType === "touch") fingers.set(event.pointerId, event.clientX); });
  for (const name of ["pointerup", "pointercancel"]) over.addEventListener(name, (event) => fingers.delete(event.pointerId));
  over.addEventListener("pointermove", (event) => {
    if (!fingers.has(event.pointerId)) return;
    const before = fingers.get(event.pointerId), others = [...fingers].filter(([id]) => id !== event.pointerId).map(([, x]) => x);
    fingers.set(event.pointerId, event.clientX);
    if (others.length) {
      const wide = Math.abs(event.clientX - others[0]), was = Math.abs(before - others[0]);
      if (wide > 10 && was > 10) zoom(was / wide, chart.posToVal((event.clientX + others[0]) / 2 - over.getBoundingClientRect().left, "x"));
    } else pan((before - event.clientX) / over.clientWidth);
  });
}
