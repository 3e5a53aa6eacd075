import { execFileSync, spawnSync } from "node:child_process";
import { copyFileSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { expect } from "@playwright/test";
import { API_EXAMPLES, type ApiExample } from "@/components/help/api-examples";
import { OPERATIONS } from "@/lib/http/openapi/document";
import { randomImage } from "./support/bench";
import { signIn } from "./support/desk";
import { appUrl, call, tokenOf } from "./support/station";
import { expectTrouble, test } from "./support/test";

/** As the page's reader would have them: three equal reads, two of the donor, a read-back. */
function makeFiles(folder: string): void {
  const image = randomImage(65_536);
  for (const name of ["read-1.bin", "read-2.bin", "read-3.bin", "back-1.bin"]) writeFileSync(path.join(folder, name), image);
  writeFileSync(path.join(folder, "own-1.bin"), randomImage(65_536));
  copyFileSync(path.join(folder, "own-1.bin"), path.join(folder, "own-2.bin"));
  // curl says nothing of its progress, and the status on a last line of its own; the commands themselves stay as they are
  writeFileSync(path.join(folder, ".curlrc"), 'silent\nshow-error\nwrite-out = "\\nSTATUS %{http_code} %{method} %{url_effective}\\n"\n');
}

interface Ran {
  text: string;
  status: number;
  method: string;
  path: string;
}

function run(folder: string, command: string, variables: Record<string, string>): Ran {
  const done = spawnSync("bash", ["-euo", "pipefail", "-c", command], { cwd: folder, env: { NODE_ENV: "test", PATH: process.env.PATH, CURL_HOME: folder, ...variables }, encoding: "utf8", timeout: 30_000 });
  expect(done.status, `${command}\n${done.stderr}`).toBe(0);
  const [line, status, method, address] = /^STATUS (\d+) (\w+) (\S+)$/m.exec(done.stdout)!;
  return { text: done.stdout.replace(line, ""), status: Number(status), method, path: new URL(address).pathname };
}

/** The described answer is the one that came. */
function expectDescribed({ method, path: at, text, status }: Ran): void {
  const one = OPERATIONS.find((other) => other.method === method && new RegExp(`^${other.path.replace(/\{\w+\}/g, "[^/]+")}$`).test(at));
  expect(one, `${method} ${at}`).toBeTruthy();
  if (one?.status !== status || !one.answer || !text.trim().startsWith("{")) return;
  const parsed = one.answer.safeParse(JSON.parse(text));
  expect(parsed.error?.issues, `${method} ${at}`).toBeUndefined();
}

let folder: string;
test.beforeAll(() => {
  folder = mkdtempSync(path.join(tmpdir(), "help-api-"));
  makeFiles(folder);
});
test.afterAll(() => rmSync(folder, { recursive: true, force: true }));

test("every command of the page does what the page says, word by word, from the case to its bundle", async () => {
  test.setTimeout(120_000);
  const variables: Record<string, string> = { TWINREAD: appUrl(), TOKEN: await tokenOf("mira"), LEAD_TOKEN: await tokenOf("ines"), JOB: `help-${Date.now()}` };
  const after: Record<string, (example: ApiExample, ran: Ran) => void> = {
    "next-seating": (_, { text }) => { variables.READ = (JSON.parse(text) as { reads: { id: string }[] }).reads[0].id; },
    seal: (_, { text }) => { variables.SEAL = String((JSON.parse(text) as { number: number }).number); },
    download: (_, { text }) => expect(text).toContain(execFileSync("sha256sum", ["read-1.bin"], { cwd: folder, encoding: "utf8" }).slice(0, 64)),
  };
  for (const example of API_EXAMPLES) {
    const { key, command, status, answer, gives } = example;
    const ran = run(folder, command, variables);
    expect(ran.status, `${key}: ${ran.text.slice(0, 500)}`).toBe(status);
    expect(ran.text, key).toContain(answer);
    expectDescribed(ran);
    if (gives) variables[gives] = (JSON.parse(ran.text) as { id: string }).id;
    after[key]?.(example, ran);
  }
});

test("the page shows every command as it is run, and nobody has to sign in for it", async ({ page }) => {
  await page.goto("/help/api");
  for (const { key, title, command, status } of API_EXAMPLES) {
    await expect(page.getByRole("region", { name: `Command: ${title}`, exact: true })).toHaveText(command, { useInnerText: false });
    await expect(page.locator(`#${key}`)).toContainText(`Answers ${status}`);
  }
});

test("the description is for anyone, the same under both addresses, and isn't sent twice", async () => {
  const first = await call("GET", "/api/openapi.json");
  expect(first.status).toBe(200);
  expect(first.headers.get("content-type")).toMatch(/^application\/json/);
  expect(first.json<{ openapi: string }>().openapi).toMatch(/^3\.1\./);
  const usual = await call("GET", "/openapi.json");
  expect(usual.bytes.equals(first.bytes)).toBe(true);
  for (const answer of [first, usual]) expect(answer.headers.get("cache-control")).toBe("public, max-age=300");
  const again = await call("GET", "/api/openapi.json", { headers: { "if-none-match": first.headers.get("etag")! } });
  expect([again.status, again.bytes.length]).toEqual([304, 0]);
});

test("a chip's finding leads to its place in the help, and back on the desk nothing is lost", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  await page.goto("/bench");
  const { items } = (await (await page.request.get("/api/bench")).json()) as { items: { chip: { id: string; state: { state: string } } }[] };
  const held = items.find((row) => row.chip.state.state === "held")!;
  await page.goto(`/chips/${held.chip.id}`);
  const link = page.getByRole("link", { name: /^What is this\?/ }).first();
  const code = (await link.getAttribute("href"))!.split("#")[1];
  await link.click();
  await expect(page).toHaveURL(new RegExp(`/help/findings#${code}$`));
  await expect(page.locator(`#${code}`)).toBeInViewport();
  // who is signed in keeps the desk's edge
  await expect(page.getByRole("navigation", { name: "Main" })).toBeVisible();
});

test("every link of the help leads somewhere, to its very place", async ({ page }) => {
  test.setTimeout(120_000);
  const seen = new Set<string>();
  const open = ["/help"];
  while (open.length > 0) {
    const at = open.pop()!;
    if (seen.has(at)) continue;
    seen.add(at);
    const answer = await page.goto(at);
    expect(answer?.status(), at).toBe(200);
    const links = await page.getByRole("main").locator("a[href]").evaluateAll((all) => all.map((one) => (one as HTMLAnchorElement).href));
    for (const href of links) {
      const to = new URL(href);
      if (to.pathname === new URL(page.url()).pathname && to.hash) expect(await page.locator(to.hash).count(), `${at}: ${to.hash}`).toBe(1);
      else if (to.hash) {
        const text = await (await page.request.get(to.pathname)).text();
        expect(text, `${at}: ${href}`).toContain(`id="${to.hash.slice(1)}"`);
      }
      if (to.pathname.startsWith("/help")) open.push(to.pathname);
    }
  }
  expect(seen.size).toBe(14);
});

test("an address of the help that there is not is not found", async ({ page }) => {
  for (const path of ["/help/nothing", "/help/toString"]) {
    expectTrouble(new RegExp(`^404 GET ${path}$`));
    expect((await page.goto(path))?.status()).toBe(404);
  }
});
