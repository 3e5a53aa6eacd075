import path from "node:path";
import type { Page } from "@playwright/test";

export interface Load {
  /** bytes as they came over the wire, heads of the answers included */
  js: number;
  css: number;
  html: number;
  shifts: number;
  /** milliseconds from the start of the load */
  firstContent: number;
  ready: number;
}

const WATCH = path.join(import.meta.dirname, "watch.mjs");
interface Watched {
  shifts: number;
  taken: number;
  busyUntil: number;
}

export const median = (list: readonly number[]) => [...list].sort((a, b) => a - b)[Math.floor(list.length / 2)];

/** One load of a page with nothing kept from an earlier one, in a tab of its own beside `page`, whose session it has. */
export async function coldLoad(page: Page, address: string): Promise<Load> {
  const tab = await page.context().newPage();
  const network = await page.context().newCDPSession(tab);
  const bytes: Record<string, number> = {};
  const kinds = new Map<string, string>();
  network.on("Network.responseReceived", ({ requestId, type }) => kinds.set(requestId, type));
  network.on("Network.loadingFinished", ({ requestId, encodedDataLength }) => {
    const kind = kinds.get(requestId) ?? "";
    bytes[kind] = (bytes[kind] ?? 0) + encodedDataLength;
  });
  await network.send("Network.enable");
  await network.send("Network.clearBrowserCache");
  await network.send("Network.setCacheDisabled", { cacheDisabled: true });
  await tab.addInitScript({ path: WATCH });
  await tab.setViewportSize(page.viewportSize() ?? { width: 1440, height: 1000 });
  await tab.goto(address);
  await tab.waitForLoadState("networkidle");
  await tab.waitForFunction("window.twinreadBench.taken > 0", undefined, { timeout: 60_000 });
  const { shifts, taken, busyUntil } = await tab.evaluate("window.twinreadBench") as Watched;
  const firstContent = await tab.evaluate("performance.getEntriesByName('first-contentful-paint')[0].startTime") as number;
  await tab.close();
  return { js: bytes.Script ?? 0, css: bytes.Stylesheet ?? 0, html: bytes.Document ?? 0, shifts, firstContent, ready: Math.max(taken, busyUntil) };
}

/** The median of several cold loads, figure by figure. */
export async function measured(page: Page, address: string, loads = 3): Promise<Load> {
  const all: Load[] = [];
  for (let i = 0; i < loads; i += 1) all.push(await coldLoad(page, address));
  const of = (figure: keyof Load) => median(all.map((one) => one[figure]));
  return { js: of("js"), css: of("css"), html: of("html"), shifts: Math.max(...all.map((one) => one.shifts)), firstContent: of("firstContent"), ready: of("ready") };
}
