/** Small things every region does with the document. */

/** @param {string} id @returns {DocumentFragment} */
export function cloned(id) {
  return /** @type {HTMLTemplateElement} */ (document.getElementById(id)).content.cloneNode(true);
}

/** @param {string} id a template that holds one element @returns {any} */
export const clonedElement = (id) => cloned(id).firstElementChild;

/** @param {ParentNode} root @param {string} name @returns {any} */
export const part = (root, name) => root.querySelector(`[data-part="${name}"]`);

/** @param {Element} node @param {string} text set only when it changes, so that a reader is not told twice */
export function say(node, text) {
  if (node.textContent !== text) node.textContent = text;
}

/**
 * Bring a list of children in line with entries, keeping nodes by key so that focus stays. Children without a key stay where they are.
 * @param {Element} list @param {any[]} entries @param {(entry: any) => string} keyOf
 * @param {(entry: any) => Element} make @param {(node: any, entry: any) => void} update
 */
export function keyed(list, entries, keyOf, make, update) {
  const old = new Map(keyedFrom(list.firstElementChild).map((node) => [node.dataset.key, node]));
  const wanted = new Set(entries.map(keyOf));
  for (const [key, node] of old) if (!wanted.has(key)) node.remove();
  let last = null;
  for (const entry of entries) {
    const key = keyOf(entry);
    let node = old.get(key);
    if (!node) {
      node = /** @type {any} */ (make(entry));
      node.dataset.key = key;
    }
    update(node, entry);
    const following = keyedFrom(last ? last.nextElementSibling : list.firstElementChild, 1)[0];
    if (following !== node) {
      if (last) last.after(node);
      else list.prepend(node);
    }
    last = node;
  }
}

/** The elements with a key from `node` on, at most `most`. @param {any} node @param {number} [most] */
function keyedFrom(node, most = Infinity) {
  const found = [];
  for (; node && found.length < most; node = node.nextElementSibling) if (node.dataset.key !== undefined) found.push(node);
  return found;
}

/**
 * Whatever rendering does to the element that has the focus, the focus is not lost: it stays, comes back, or goes to the nearest
 * thing around it that can take it.
 * @param {() => void} render
 */
export function keepingFocus(render) {
  const held = /** @type {any} */ (document.activeElement);
  const around = [];
  for (let node = held; node; node = node.parentElement) around.push(node);
  render();
  if (held === document.body || (document.activeElement === held && !held.closest("[hidden]"))) return;
  if (document.activeElement !== document.body && document.activeElement !== held) return;      // somebody gave it away on purpose
  around.find((node) => node.isConnected && !node.closest("[hidden]") && node.matches(TAKES_FOCUS))?.focus({ preventScroll: true });
}

const TAKES_FOCUS = "button, input, textarea, select, a[href], [tabindex]";

/** @param {string} label @param {() => void} act @param {string} [kind] */
export function button(label, act, kind = "plain") {
  const node = document.createElement("button");
  node.type = "button";
  node.className = kind;
  node.textContent = label;
  node.addEventListener("click", act);
  return node;
}

/** @param {string} name @param {string} [text] @param {string} [className] */
export function element(name, text = "", className = "") {
  const node = document.createElement(name);
  if (text) node.textContent = text;
  if (className) node.className = className;
  return node;
}

const SVG = "http://www.w3.org/2000/svg";

/** An SVG element. @param {string} name @param {Record<string, string | number>} attributes @param {string} [text] */
export function shape(name, attributes, text = "") {
  const node = document.createElementNS(SVG, name);
  for (const [key, value] of Object.entries(attributes)) node.setAttribute(key, String(value));
  if (text) node.textContent = text;
  return node;
}
