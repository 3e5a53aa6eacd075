import type { Page } from "@playwright/test";

export interface Smoothness {
  frames: number;
  /** milliseconds between one drawn frame and the next */
  p50: number;
  p95: number;
  worst: number;
  /** the longest piece of work on the page's main thread */
  longestTask: number;
}

interface TraceEvent {
  name: string;
  ts: number;
  dur?: number;
  pid: number;
  tid: number;
  args?: { name?: string };
}

const CATEGORIES = ["devtools.timeline", "disabled-by-default-devtools.timeline", "disabled-by-default-devtools.timeline.frame", "devtools.timeline.frame", "toplevel", "blink.user_timing", "__metadata"];
const [BEGINS, ENDS] = ["bench-begins", "bench-ends"];

/** What the browser's own tracing says of the frames while `work` is done on the page. */
export async function traced(page: Page, work: () => Promise<void>): Promise<Smoothness> {
  const browser = page.context().browser()!;
  await browser.startTracing(page, { categories: CATEGORIES });
  await page.evaluate((name) => void performance.mark(name), BEGINS);
  await work();
  await page.evaluate((name) => void performance.mark(name), ENDS);
  const { traceEvents } = JSON.parse((await browser.stopTracing()).toString("utf8")) as { traceEvents: TraceEvent[] };
  const [from, to] = [BEGINS, ENDS].map((name) => traceEvents.find((event) => event.name === name)!);
  const within = traceEvents.filter((event) => event.pid === from.pid && event.ts >= from.ts && event.ts <= to.ts);
  const drawn = within.filter((event) => event.name === "DrawFrame").map((event) => event.ts / 1000).sort((a, b) => a - b);
  const gaps = drawn.slice(1).map((at, i) => at - drawn[i]).sort((a, b) => a - b);
  const tasks = within.filter((event) => event.tid === from.tid && /RunTask$/.test(event.name)).map((event) => (event.dur ?? 0) / 1000);
  const at = (share: number) => gaps[Math.min(gaps.length - 1, Math.floor(gaps.length * share))] ?? 0;
  return { frames: drawn.length, p50: at(0.5), p95: at(0.95), worst: gaps.at(-1) ?? 0, longestTask: Math.max(0, ...tasks) };
}

/** As a wheel that keeps turning, at so many px a second. */
export async function byWheel(page: Page, selector: string, distance: number, speed: number): Promise<void> {
  const box = (await page.locator(selector).boundingBox())!;
  const session = await page.context().newCDPSession(page);
  await session.send("Input.synthesizeScrollGesture", { x: Math.round(box.x + box.width / 2), y: Math.round(box.y + Math.min(box.height, 400) / 2), yDistance: -distance, speed, gestureSourceType: "mouse", preventFling: true });
  await session.detach();
}

/** As a scroll bar that is dragged from one end to the other: one step a frame. */
export async function byDragging(page: Page, selector: string, frames: number): Promise<void> {
  await page.evaluate(async ([box, steps]) => {
    const element = document.querySelector(box)!;
    for (let i = 1; i <= steps; i += 1) {
      element.scrollTop = ((element.scrollHeight - element.clientHeight) * i) / steps;
      await new Promise(requestAnimationFrame);
    }
  }, [selector, frames] as const);
}

/** Page by page, as long as somebody holds the key down. */
export async function byPageKey(page: Page, selector: string, times: number): Promise<void> {
  await page.locator(selector).focus();
  for (let i = 0; i < times; i += 1) {
    await page.keyboard.press("PageDown");
    await page.waitForTimeout(30);
  }
}
