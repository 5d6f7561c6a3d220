/** The series panel's door: what it needs is loaded when it is first opened. */

/** @param {HTMLElement} root */
export function mountSeries(root) {
  let asked = false;
  return (state) => {
    if (state.panel !== "series" || asked) return;
    asked = true;
    import("./series.js").then(({ openSeries }) => openSeries(root), (error) => {
      asked = false;
      root.querySelector('[data-part="room"]').textContent = `The series could not be loaded: ${error.message}. Close and open it again.`;
    });
  };
}
