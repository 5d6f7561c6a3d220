/** How much of the window the figure takes, and how much an on-screen keyboard covers, as lengths the styles use. */

/** @param {HTMLElement} figure */
export function measureViewport(figure) {
  const set = (name, pixels) => document.documentElement.style.setProperty(name, `${Math.round(pixels)}px`);
  new ResizeObserver(() => set("--bar", figure.offsetHeight)).observe(figure);
  const seen = window.visualViewport;
  if (!seen) return;
  // Where the keyboard does not make the page smaller, it lies over it: the figure goes above it.
  const look = () => set("--below", seen.scale > 1.01 ? 0 : Math.max(0, innerHeight - seen.height - seen.offsetTop));
  seen.addEventListener("resize", look);
  seen.addEventListener("scroll", look);
  look();
}
