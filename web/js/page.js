/** Small things every region does with the document. */

/** @param {string} id @returns {DocumentFragment} */
export function cloned(id) {
  return /** @type {HTMLTemplateElement} */ (document.getElementById(id)).content.cloneNode(true);
}

/** @param {ParentNode} root @param {string} name @returns {any} */
export const part = (root, name) => root.querySelector(`[data-part="${name}"]`);

/** @param {Element} node @param {string} text set only when it changes, so that a reader is not told twice */
export function say(node, text) {
  if (node.textContent !== text) node.textContent = text;
}

/**
 * Bring a list of children in line with entries, keeping nodes by key so that focus stays.
 * @param {Element} list @param {any[]} entries @param {(entry: any) => string} keyOf
 * @param {(entry: any) => Element} make @param {(node: any, entry: any) => void} update
 */
export function keyed(list, entries, keyOf, make, update) {
  const old = new Map([...list.children].map((node) => [/** @type {any} */ (node).dataset.key, node]));
  entries.forEach((entry, index) => {
    const key = keyOf(entry);
    let node = old.get(key);
    old.delete(key);
    if (!node) {
      node = make(entry);
      /** @type {any} */ (node).dataset.key = key;
    }
    update(node, entry);
    if (list.children[index] !== node) list.insertBefore(node, list.children[index] ?? null);
  });
  for (const node of old.values()) node.remove();
}

/** @param {string} label @param {() => void} act @param {string} [kind] */
export function button(label, act, kind = "plain") {
  const node = document.createElement("button");
  node.type = "button";
  node.className = kind;
  node.textContent = label;
  node.addEventListener("click", act);
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
