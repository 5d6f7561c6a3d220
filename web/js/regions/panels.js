/** The panels behind the tools: one open at a time, closed by its button or Escape, the focus going in and coming back. */

/** @param {HTMLElement[]} panels @param {HTMLElement} opener @param {(intention: object) => void} dispatch */
export function mountPanels(panels, opener, dispatch) {
  let open = "";
  for (const panel of panels) {
    panel.querySelector('[data-action="close"]').addEventListener("click", () => dispatch({ type: "panel", name: "" }));
    panel.addEventListener("keydown", (event) => { if (event.key === "Escape") dispatch({ type: "panel", name: "" }); });
  }
  return (state) => {
    if (state.panel === open) return;
    const held = panels.some((panel) => panel.contains(document.activeElement));
    open = state.panel;
    document.body.dataset.panel = open;
    for (const panel of panels) panel.hidden = panel.id !== open;
    const shown = panels.find((panel) => panel.id === open);
    if (shown) {
      shown.focus({ preventScroll: true });
      shown.scrollIntoView({ block: "start" });
    } else if (held) {
      opener.focus({ preventScroll: true });
    }
  };
}
