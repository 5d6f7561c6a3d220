/** Draw the core's formula trees as MathML. Brackets are in the tree; nothing is decided here. */
const MATH = "http://www.w3.org/1998/Math/MathML";

/** @param {string} name @param {...(Node | string)} children */
function element(name, ...children) {
  const node = document.createElementNS(MATH, name);
  node.append(...children);
  return node;
}

const SIGNS = { "+": "+", "-": "−", "*": "⋅" };

/** @param {any[]} tree @returns {Element} */
function draw([kind, ...parts]) {
  switch (kind) {
    case "symbol": {
      const letter = element("mi", parts[0]);
      return parts[1] ? element("msub", letter, element("mtext", parts[1])) : letter;
    }
    case "number": return parts[1] ? element("mrow", element("mn", parts[0]), element("mtext", `\u2009${parts[1]}`)) : element("mn", parts[0]);
    case "/": return element("mfrac", draw(parts[0]), draw(parts[1]));
    case "^": return element("msup", draw(parts[0]), draw(parts[1]));
    case "neg": return element("mrow", element("mo", "−"), draw(parts[0]));
    case "call": return element("mrow", element("mi", parts[0]), element("mo", "("), draw(parts[1]), element("mo", ")"));
    case "()": return element("mrow", element("mo", "("), draw(parts[0]), element("mo", ")"));
    default: return element("mrow", draw(parts[0]), element("mo", SIGNS[kind]), draw(parts[1]));
  }
}

/** One symbol alone. @param {any[]} tree */
export function symbol(tree) {
  return element("math", draw(tree));
}

/**
 * An equation: result = formula (= value).
 * @param {any[]} result @param {any[]} tree @param {string} spoken @param {string} [value]
 */
export function equation(result, tree, spoken, value) {
  const row = element("mrow", draw(result), element("mo", "="), draw(tree));
  if (value) row.append(element("mo", "="), element("mtext", value));
  const math = element("math", row);
  math.setAttribute("display", "block");
  math.setAttribute("aria-label", spoken);
  return math;
}

/** Where one is wider than its place, it can be scrolled by keys as well. @type {ResizeObserver | null} */
const widths = "ResizeObserver" in globalThis ? new ResizeObserver((entries) => {
  for (const { target } of entries) {
    const box = /** @type {HTMLElement} */ (target);
    if (box.scrollWidth > box.clientWidth) box.tabIndex = 0;
    else box.removeAttribute("tabindex");
  }
}) : null;

/** Put an equation into its box. @param {HTMLElement} box @param {Element} drawn */
export function placeEquation(box, drawn) {
  box.setAttribute("role", "group");
  box.setAttribute("aria-label", "Formula");
  box.append(drawn);
  widths?.observe(box);
}
