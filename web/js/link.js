/** A link's code in the address: the sender's figure can be read at once, the sheet only by the core. */
const HEAD = 4;

/** The code behind #, whatever a mail program made of the sign. @param {string} address */
export function codeIn(address) {
  const fragment = address.replace(/%(25)*23/g, "#").split("#").slice(1).join("");
  return /^[0-9][tz]/.test(fragment) ? fragment : "";
}

/** The figure as its sender saw it, unchecked. @param {string} code */
export function figureAsSent(code) {
  try {
    const length = parseInt(code.slice(2, HEAD), 36);
    const text = code.slice(HEAD, HEAD + length).replace(/-/g, "+").replace(/_/g, "/");
    return new TextDecoder("utf-8", { fatal: true }).decode(Uint8Array.from(atob(text), (sign) => sign.charCodeAt(0)));
  } catch {
    return "";
  }
}

/** The whole link; a page opened from a file has no address others could open, so there the code goes alone. @param {string} code */
export const linkOf = (code) => (location.protocol === "file:" ? code : `${location.origin}${location.pathname}#${code}`);
