/** What a series came to: counts, bad rows, means, the plot with its table, the spread of the figures, the files to take away. */
import { button, element } from "../page.js";
import { drawSeries } from "./series-plot.js";

const SHOWN = 200;                     // lines of a table on the page; the files hold all
const BINS = 40;

/** @param {HTMLElement} box @param {{workbook: () => void}} acts */
export function mountSeriesResults(box, acts) {
  return { clear: () => box.replaceChildren(), show: (found, settings, name) => show(box, acts, found, settings, name) };
}

function show(box, acts, found, settings, name) {
  const counts = element("div");
  counts.append(...found.summary.map((line) => element("p", line, "figures")));
  if (found.statistics.length) counts.append(table(found.statistics[0], found.statistics.slice(1)));
  box.replaceChildren(element("h3", "Restated"), counts, files(found, settings, name, acts), badRows(found), ...plots(found), means(found));
  box.querySelector("h3").scrollIntoView({ block: "start" });
  for (const draw of drawn.splice(0)) draw();
}

const drawn = [];                      // what needs its place on the page before it can be drawn

function files(found, settings, name, acts) {
  const base = name.replace(/\.[^.]*$/, ""), part = element("div", "", "row");
  const give = (label, blob, ending) => button(label, () => save(blob, `${base}${ending}`));
  if (found.files.rows) part.append(give("Rows as CSV", found.files.rows, ".restated.csv"));
  if (found.files.means) part.append(give("Means as CSV", found.files.means, ".means.csv"));
  if (found.files.book) part.append(give("The workbook is ready: take it", found.files.book, ".restated.xlsx"));
  else part.append(button("Make a workbook (XLSX)", acts.workbook));
  part.append(give("Settings", new Blob([JSON.stringify(settings, null, 1)], { type: "application/json" }), ".settings.json"),
    give("Record", new Blob([JSON.stringify({ ...found, files: undefined, columnsDrawn: undefined, means_listed: undefined, statistics: undefined, summary: undefined }, null, 1)], { type: "application/json" }), ".record.json"));
  return part;
}

function save(blob, name) {
  const link = element("a"), address = URL.createObjectURL(blob);
  Object.assign(link, { href: address, download: name });
  link.click();
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}

function badRows(found) {
  const part = element("details");
  if (!found.bad) return element("p", "No row was without its figures.", "quiet");
  part.append(element("summary", `${found.bad} rows without all their figures`));
  const reasons = element("ul");
  reasons.append(...found.reasons.map((entry) => element("li", `${entry.rows} × ${entry.reason}`)));
  part.append(reasons, table(["line", "column", "why"], found.bad_rows.map((entry) => [String(entry.line), entry.column, entry.reason])));
  if (found.bad_rows_not_listed) part.append(element("p", `${found.bad_rows_not_listed} more are in the file of rows.`, "quiet"));
  return part;
}

function plots(found) {
  const [stamps, ...figures] = found.columnsDrawn;
  const times = stamps.map((second) => second + found.offset_s);
  return found.species.map((species, place) => {
    const part = element("section", "", "series-drawn"), frame = element("div", "", "series-plot");
    frame.tabIndex = 0;
    frame.setAttribute("role", "img");
    frame.setAttribute("aria-label", `${species.name} over time, ${species.unit_text} ${species.basis}. Arrow keys move, plus and minus zoom, Home shows all. The means table holds the same.`);
    const windows = [...new Set(found.means_listed.map((mean) => mean.window))], choice = element("select");
    choice.append(...windows.map((window) => new Option(window, window)));
    const label = element("label", "means of ", "choice");
    label.append(choice);
    let shown = null;
    const draw = () => {
      const taken = found.means_listed.filter((mean) => mean.species === species.name && mean.window === choice.value && mean.enough)
        .map((mean) => ({ start: mean.start + found.offset_s, end: mean.end + found.offset_s, value: mean.value }));
      shown = drawSeries(frame, { times, figures: figures[place], means: taken, limit: found.upper_limits[place] ?? null, title: "" });
    };
    choice.addEventListener("change", draw);
    drawn.push(draw);
    const tools = element("div", "", "row");
    tools.append(...(windows.length ? [label] : []), button("Closer", () => shown?.zoom(0.5)), button("Farther", () => shown?.zoom(2)), button("‹ earlier", () => shown?.pan(-0.5)), button("later ›", () => shown?.pan(0.5)));
    part.append(element("h4", `${species.text} in ${species.unit_text} ${species.basis}`), frame, tools,
      element("p", "Thin: rows, as their extremes where there are more than the screen has points. Thick: means with enough data. Dashed: the limit. Drag across to look closer.", "quiet"), spread(figures[place], found.ends[place]));
    return part;
  });
}

/** How often the figures lie where: equal bins from the lowest to the highest. */
function spread(figures, ends) {
  let low = Infinity, high = -Infinity;
  for (const value of figures) { if (value < low) low = value; if (value > high) high = value; }
  const part = element("details");
  part.append(element("summary", "How the rows are spread"));
  if (!(high > low)) return part;
  const counts = new Array(BINS).fill(0);
  for (const value of figures) if (value === value) counts[Math.min(BINS - 1, Math.floor((value - low) / (high - low) * BINS))] += 1;
  const most = Math.max(...counts), svg = document.createElementNS("http://www.w3.org/2000/svg", "svg");
  svg.setAttribute("viewBox", `0 0 ${BINS * 10} 100`);
  svg.setAttribute("class", "series-spread");
  svg.setAttribute("role", "img");
  svg.setAttribute("aria-label", "Histogram of the rows");
  counts.forEach((count, place) => {
    const bar = document.createElementNS("http://www.w3.org/2000/svg", "rect");
    for (const [key, value] of Object.entries({ x: place * 10 + 1, width: 8, y: 100 - 100 * count / most, height: 100 * count / most })) bar.setAttribute(key, String(value));
    svg.append(bar);
  });
  part.append(svg, element("p", ends, "quiet figures"));
  return part;
}

function means(found) {
  const part = element("details");
  part.append(element("summary", `${found.means_listed.length} means`));
  if (!found.means_listed.length) return part;
  part.open = true;
  part.append(table(found.mean_names, found.means_listed.slice(0, SHOWN).map((mean) => mean.texts)));
  if (found.means_listed.length > SHOWN) part.append(element("p", "The others are in the file of means.", "quiet"));
  return part;
}

function table(names, rows) {
  const box = element("div", "", "series-scroll"), node = element("table", "", "series-table"), head = element("tr");
  box.tabIndex = 0;
  head.append(...names.map((name) => element("th", name)));
  node.append(head, ...rows.map((cells) => {
    const line = element("tr");
    line.append(...cells.map((cell) => element("td", cell, "figures")));
    return line;
  }));
  box.append(node);
  return box;
}
