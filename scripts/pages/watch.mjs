// Runs in a page before its own scripts and keeps in `window.twinreadBench` what a measurement asks for afterwards.
const bench = { shifts: 0, taken: 0, busyUntil: 0, tasks: [] };
window.twinreadBench = bench;

new PerformanceObserver((list) => {
  for (const shift of list.getEntries()) if (!shift.hadRecentInput) bench.shifts += shift.value;
}).observe({ type: "layout-shift", buffered: true });

new PerformanceObserver((list) => {
  for (const task of list.getEntries()) {
    bench.tasks.push(task.duration);
    bench.busyUntil = Math.max(bench.busyUntil, task.startTime + task.duration);
  }
}).observe({ type: "longtask", buffered: true });

// React leaves its own property on each part of the page that it has taken over: from then on the part answers
const answers = (part) => Object.keys(part).some((key) => key.startsWith("__reactFiber$"));
const look = () => {
  const parts = document.readyState === "loading" ? [] : [...document.querySelectorAll("a[href], button, input, select, textarea, summary")];
  if (parts.length > 0 && parts.every(answers)) bench.taken = performance.now();
  else requestAnimationFrame(look);
};
requestAnimationFrame(look);
