/** A QR code as one SVG path: black on white whatever the theme, with the quiet zone the standard asks for. */
import { encode } from "../../libraries/uqr.js";
import { shape } from "../page.js";

const QUIET_ZONE = 4;                  // modules, ISO/IEC 18004
const LARGEST = 20;                    // the version a phone still reads off another phone's screen

/** @param {string} text @returns {SVGElement | null} null where it would be too dense to scan */
export function qrCode(text) {
  let found;
  try {
    found = encode(text, { ecc: "M", boostEcc: false, border: 0, maxVersion: LARGEST });
  } catch {
    return null;
  }
  const size = found.size + 2 * QUIET_ZONE;
  const drawn = shape("svg", { viewBox: `0 0 ${size} ${size}`, class: "qr", role: "img", "aria-label": "QR code of the link", "shape-rendering": "crispEdges" });
  drawn.append(shape("rect", { width: size, height: size, fill: "#fff", stroke: "none" }), shape("path", { d: runs(found.data), fill: "#000", stroke: "none" }));
  return drawn;
}

/** Dark modules, row by row, each run of neighbours as one bar. @param {boolean[][]} rows */
function runs(rows) {
  const bars = [];
  rows.forEach((row, y) => {
    for (let x = 0; x < row.length; x++) {
      if (!row[x]) continue;
      const from = x;
      while (row[x + 1]) x++;
      bars.push(`M${from + QUIET_ZONE} ${y + QUIET_ZONE}h${x - from + 1}v1H${from + QUIET_ZONE}z`);
    }
  });
  return bars.join("");
}
