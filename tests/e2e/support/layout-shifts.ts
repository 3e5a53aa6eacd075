/** How a page tells of its shifts in the console. */
export const SHIFT = "layout shift ";

/**
 * Runs in the page before its own scripts: says when what is on the screen has moved by 0.05 or more (CLS) while the page
 * loads, which is until somebody does something with it or prints it, for five seconds at most.
 */
export function layoutShifts(word: string): void {
  interface Shift extends PerformanceEntry { value: number; hadRecentInput: boolean; sources: { node: Node | null; previousRect: DOMRect; currentRect: DOMRect }[] }
  let sum = 0;
  let loading = true;
  let moved: string[] = [];
  for (const kind of ["pointerdown", "keydown", "input", "change", "wheel"]) addEventListener(kind, () => { loading = false; }, { capture: true, passive: true });
  // a page laid out for paper tells of it only after it was moved
  const paper = matchMedia("print");
  paper.addEventListener("change", () => { loading = false; });
  const named = (node: Node | null) => (node instanceof Element ? node : node?.parentElement)?.outerHTML.slice(0, 120) ?? "a part that is gone";
  new PerformanceObserver((list) => {
    if (paper.matches) loading = false;
    for (const shift of list.getEntries() as Shift[]) {
      if (!loading || paper.matches || shift.hadRecentInput || shift.startTime > 5000) continue;
      sum += shift.value;
      moved.push(...shift.sources.map(({ node, previousRect: from, currentRect: to }) => `${from.x},${from.y} to ${to.x},${to.y}: ${named(node)}`));
    }
    if (sum < 0.05) return;
    console.debug(`${word}${sum.toFixed(3)} ${location.href} ${moved.join(" | ")}`);
    [sum, moved] = [0, []];
  }).observe({ type: "layout-shift", buffered: true });
}
