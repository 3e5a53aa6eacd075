import { mkdirSync } from "node:fs";
import path from "node:path";
import type { Browser, Page } from "@playwright/test";
import { PRINTED } from "@/lib/core/paper";
import { env } from "@/lib/env";
import type { CaseRow, CaseView, ListView } from "@/lib/views";
import { atTheDemo, Missing, pathFor, signedIn, visitor } from "./pictures/demo";

// `npm run screens`: every page and state of the demo that runs on this data folder, at two widths, by day and by night,
// as <data folder>/screens/<person>-<page>-<width>-<theme>.png. Whoever changes a screen looks at it here. Nothing is changed.
// `npm run screens -- chip` takes only the pages whose name holds "chip".
const target = path.join(env().dataDir, "screens");
const only = process.argv[2] ?? "";

/** name, path, and what is done there before the picture. `:case`, `:drive`, `:chip` and `:donor` are those of the customer named after `@`, with the chip after a slash. */
type Screen = readonly [name: string, path: string, step?: (page: Page) => Promise<unknown>];
const HARROW = "@Harrow & Finch Surveyors";
const KEMBLE = "@Jory Kemble";

const press = (name: string | RegExp) => (page: Page) => page.getByRole("button", { name, ...(typeof name === "string" ? { exact: true } : {}) }).first().click();
const follow = (href: string) => async (page: Page) => {
  await page.locator(`main a[href^="${href}"]`).first().click();
  await page.waitForURL(`**${href}*`);
};
const type = (label: string, text: string, then: string) => async (page: Page) => {
  await page.getByLabel(label, { exact: true }).first().fill(text);
  await press(then)(page);
};
const inTurn = (...steps: ((page: Page) => Promise<unknown>)[]) => async (page: Page) => {
  for (const step of steps) await step(page);
};
const choose = (label: string, ...names: string[]) => (page: Page) =>
  page.getByLabel(label).first().setInputFiles(names.map((name) => ({ name, mimeType: "application/octet-stream", buffer: Buffer.alloc(5000, name) })));

const STATES: readonly (readonly [state: string, customer: string])[] = [
  ["unread", "Wren Ferry Archive Trust"], ["needs-reads", "Tamsin Oduya"], ["disagree", "Harrow & Finch Surveyors/U3"], ["blank", "Brindle Moor Joinery"], ["address-line", "Beno Takkar"],
  ["copy", "Lindmoor Veterinary Practice"], ["asked", "Halden Ropeworks"], ["late", "Kestrel Row Dental"], ["approved", "Isolde Brankov"], ["written", "Petra Vallin"], ["half-back", "Gant & Thistle Accounts"],
  ["write-again", "Hollin Gate Choir School"], ["verified", "Marlow Quay Harbour Office"], ["closed", "Jory Kemble/U3"], ["reference", "Harrow & Finch Surveyors/B U3"], ["no-read", "Maud Tillery"],
];

const ANYBODY: readonly Screen[] = [
  ["sign-in", "/sign-in"],
  ["sign-in-refused", "/sign-in", async (page) => { await page.getByLabel("E-mail address").fill("nobody@alderlane.example"); await type("Password", "something else", "Sign in")(page); await page.getByText("That didn’t match.").waitFor(); }],
  ["not-found", "/nothing-here"],
  ["request", "/request"],
  ["request-mistakes", "/request", press(/^Send the request/)],
  ["verify", "/verify"],
  ["verify-file", "/verify", choose("Case bundle or chip image", "odd.bin")],
  ["verify-no-bundle", "/verify", choose("Case bundle or chip image", "odd.zip")],
  ["help", "/help"],
  ["link-shows-nothing", `/summary/${"x".repeat(43)}`],
  ["request-shows-nothing", `/request/${"x".repeat(43)}`],
];

const MIRA: readonly Screen[] = [
  ["bench", "/bench"],
  ["bench-mine", "/bench?who=mine"],
  ["keys", "/bench", press("Keys")],
  ["account-menu", "/bench", (page) => page.locator("header summary").first().click()],
  ["receive", "/receive"],
  ["receive-one", "/receive", follow("/receive/")],
  ["receive-nothing", "/receive?q=nothing+of+the+kind"],
  ["cases", "/cases"],
  ["cases-closed", "/cases?state=closed"],
  ["cases-none", "/cases?q=nothing+of+the+kind"],
  ["case-new", "/cases/new"],
  ["case-new-mistakes", "/cases/new", press("Record the case")],
  ["case", `/cases/:case${HARROW}`],
  ["case-closed", `/cases/:case${KEMBLE}`],
  ["case-requested", "/cases/:case@Corin Ashdale"],
  ["case-on-hold", "/cases/:case@Maud Tillery"],
  ["case-no-chip", "/cases/:case@Ferrow Print Works"],
  ["case-just-received", "/cases/:case@Orsolya Penn"],
  ["case-verified", "/cases/:case@Anselm Roe"],
  ["case-not-found", "/cases/00000000-0000-4000-8000-000000000000"],
  ...(["Add a drive…", "Correct the case…", "Put on hold…", "Add a note…", "Go on with the case…"] as const).map((name): Screen => [`dialog-${name.toLowerCase().replace(/\W+/g, "-").replace(/-$/, "")}`, `/cases/:case${name.startsWith("Go on") ? "@Maud Tillery" : HARROW}`, press(name)]),
  ["print", `/cases/:case/print${HARROW}`],
  ...PRINTED.filter((what) => what !== "write-ticket" && what !== "erasure").map((what): Screen => [`print-${what}`, `/cases/:case/print/${what}${HARROW}`]),
  ["print-write-ticket", "/cases/:case/print/write-ticket?of=:chip@Isolde Brankov"],
  ["print-write-ticket-refused", `/cases/:case/print/write-ticket?of=:chip${HARROW}`],
  ["print-erasure-none", `/cases/:case/print/erasure${KEMBLE}`],
  ["drive", `/drives/:drive${HARROW}`],
  ["drive-verified", "/drives/:drive@Marlow Quay Harbour Office"],
  ["drive-shelf", "/drives/:drive@Orsolya Penn"],
  ...(["Correct drive…", "Correct board…", "Add a chip…", "Hand over…", "Place the chips…"] as const).map((name): Screen => [`dialog-${name.toLowerCase().replace(/\W+/g, "-").replace(/-$/, "")}`, `/drives/:drive${HARROW}`, press(name)]),
  ["dialog-correct-chip", `/drives/:drive${HARROW}`, press(/^Correct U3/)],
  ["dialog-add-board", "/cases/:case@Orsolya Penn", press("Add the original board…")],
  ["dialog-start-up", "/drives/:drive@Marlow Quay Harbour Office", press("Record a start-up test…")],
  ["photo", `/cases/:case${HARROW}`, inTurn(follow("/drives/"), follow("/photos/"))],
  ...STATES.map(([state, of]): Screen => [`chip-${state}`, `/chips/:chip@${of}`]),
  ["chip-donor", `/chips/:donor${HARROW}/U3`],
  ["chip-not-found", "/chips/00000000-0000-4000-8000-000000000000"],
  ["chip-files-held", `/chips/:chip${HARROW}/U3`, async (page) => {
    await page.getByLabel("Which content is it?").selectOption("before");
    await page.locator("input[type=file]").first().setInputFiles([{ name: "26_A_U3_r4.bin", mimeType: "application/octet-stream", buffer: Buffer.alloc(5000, 7) }, { name: "text.hex", mimeType: "text/plain", buffer: Buffer.from(":020000040000FA\n:0400000001020304F2\n:00000001FF\n") }]);
  }],
  ["dialog-set-aside", `/chips/:chip${HARROW}/U3`, press(/^Set Read 2 aside|^Set aside/)],
  ["dialog-transfer", "/chips/:chip@Isolde Brankov", press("Record the transfer…")],
  ["compare", `/chips/:chip/compare${HARROW}/U3`],
  ["compare-equal", "/chips/:chip/compare@Lindmoor Veterinary Practice"],
  ["compare-one-read", "/chips/:chip/compare@Wren Ferry Archive Trust"],
  ["decision-no-right", "/chips/:chip/decision@Halden Ropeworks"],
  ["custody", "/custody"],
  ["log", `/drives/:drive/custody${HARROW}`],
  ["log-checked", `/drives/:drive/custody${HARROW}`, async (page) => { await press("Check the log")(page); await page.getByText(/entries link\./).waitFor(); }],
  ["find", "/find"],
  ["find-nothing", "/find?q=DEADBEEF"],
  ["find-cases", "/find?q=26"],
  ["shelf", "/shelf"],
  ["shelf-none", "/shelf?q=nothing+of+the+kind"],
  ["shelf-board", "/shelf", (page) => page.getByRole("link", { name: /^D-\d{4}/ }).last().click()],
  ["shelf-import", "/shelf/import"],
  ["dialog-shelf", "/shelf", press("Put a board on the shelf…")],
  ["items", "/items"],
  ["account", "/account"],
  ["policy", "/policy"],
  ["users-no-right", "/users"],
];

const INES: readonly Screen[] = [
  ["bench", "/bench"],
  ["decision", "/chips/:chip/decision@Halden Ropeworks"],
  ["decision-reason", "/chips/:chip/decision@Lindmoor Veterinary Practice"],
  ["decision-blocked", `/chips/:chip/decision${HARROW}/U3`],
  ["decision-late", "/chips/:chip/decision@Kestrel Row Dental"],
  ["decision-signed", "/chips/:chip/decision@Isolde Brankov"],
  ["dialog-send-back", "/chips/:chip/decision@Halden Ropeworks", press("Send back…")],
  ["dialog-revoke", "/chips/:chip@Isolde Brankov", press("Revoke…")],
  ["dialog-download", `/chips/:chip${HARROW}/U3`, press(/^Download Read 1/)],
  ["dialog-composite", `/chips/:chip${HARROW}/U3`, press("Make a composite…")],
  ["case-verified", "/cases/:case@Anselm Roe"],
  ["case-closed", `/cases/:case${KEMBLE}`],
  ["dialog-summary", "/cases/:case@Marlow Quay Harbour Office", press("Send summary…")],
  ["dialog-return", "/cases/:case@Anselm Roe", press("Record the return…")],
  ["dialog-close", "/cases/:case@Ferrow Print Works", press("Close the case…")],
  ["dialog-reopen", `/cases/:case${KEMBLE}`, press("Reopen the case…")],
  ["dialog-keep", `/cases/:case${KEMBLE}`, press(/^Keep .*…$/)],
  ["dialog-other-board", `/drives/:drive${HARROW}`, press("Take another board by its number…")],
];

const AUDIT = ["", "drives", "seals", "images", "assessments", "hand-outs", "refusals", "sign-ins", "sign-ins/tokens", "sign-ins/limits", "clock"];
const RHYS: readonly Screen[] = [
  ...AUDIT.map((part): Screen => [["audit", ...(part ? part.split("/") : [])].join("-"), `/audit${part && `/${part}`}`]),
  ["log-workshop", "/custody/workshop"],
  ["chip", `/chips/:chip${HARROW}/U3`],
  ["case", `/cases/:case${HARROW}`],
];
const ODILE: readonly Screen[] = [
  ["users", "/users"],
  ["dialog-add-user", "/users", press("Add a user…")],
  ["dialog-change-user", "/users", press(/^Change/)],
  ["policy", "/policy"],
  ["outbox", "/outbox"],
  ["outbox-mail", "/outbox", (page) => page.locator("main details summary").first().click()],
  ["audit-seals", "/audit/seals"],
  ["bench", "/bench"],
];
const PEOPLE = { mira: MIRA, ines: INES, rhys: RHYS, odile: ODILE };

/** The path with the customer's ids in it. */
async function addressOf(page: Page, text: string): Promise<string> {
  const [address, of] = text.split("@");
  if (!of) return address;
  const [customer, name = ""] = of.split("/");
  const { items } = (await (await page.request.get(`/api/cases?q=${encodeURIComponent(customer)}`)).json()) as ListView<CaseRow>;
  if (!items[0]) throw new Missing(`The demo has no case of ${customer}. Take the pictures of a fresh demo.`);
  const view = (await (await page.request.get(`/api/cases/${items[0].id}`)).json()) as CaseView;
  const drive = view.drives.find(({ letter }) => letter === (/^([A-Z]) /.exec(name)?.[1] ?? "A"));
  const chip = (role: string) => drive?.boards.find((board) => board.role === role)?.chips.find(({ designator }) => designator === (/U\d+$/.exec(name)?.[0] ?? designator));
  const ids: Record<string, string | undefined> = { ":case": view.id, ":drive": drive?.id, ":chip": chip("original")?.id, ":donor": chip("donor")?.id };
  return address.replace(/:\w+/g, (word) => ids[word] ?? word);
}

async function take(page: Page, person: string, [name, at, step]: Screen): Promise<void> {
  await page.setViewportSize({ width: 1440, height: 1000 });
  await page.emulateMedia({ colorScheme: "light" });
  await page.goto(await addressOf(page, at));
  await page.waitForLoadState("networkidle");
  await step?.(page);
  await page.waitForLoadState("networkidle");
  await page.evaluate(() => document.fonts.ready);
  // what lies over the page is as high as the window
  const over = /^(dialog-|keys|account-menu)/.test(name);
  if (over && name !== "account-menu") await page.getByRole("dialog").waitFor();
  for (const width of [1440, 390]) {
    await page.setViewportSize({ width, height: width < 900 ? 844 : 1000 });
    for (const theme of ["day", "night"]) {
      await page.emulateMedia({ colorScheme: theme === "night" ? "dark" : "light" });
      await page.screenshot({ path: path.join(target, `${person}-${name}-${width}-${theme}.png`), fullPage: !over });
    }
  }
}

/** A page for each topic that the help's first page leads to. */
async function helpPages(browser: Browser): Promise<Screen[]> {
  const page = await visitor(browser);
  await page.goto("/help");
  const hrefs = await page.locator('main a[href^="/help/"]').evaluateAll((links) => [...new Set(links.map((link) => link.getAttribute("href") ?? ""))]);
  await page.close();
  return hrefs.filter((href) => !href.includes("#")).map((href): Screen => [href.slice(1).replaceAll("/", "-"), href]);
}

async function takeAll(browser: Browser): Promise<void> {
  mkdirSync(target, { recursive: true });
  const links: Screen[] = [
    ["requested", await pathFor("corin@ashdale.example", "request")], ["slip", `${await pathFor("corin@ashdale.example", "request")}/slip`],
    ["summary", await pathFor("jory.kemble@kemble.example", "summary")], ["requested-closed", await pathFor("jory.kemble@kemble.example", "request")],
  ];
  for (const [person, screens] of [["anybody", [...ANYBODY, ...(await helpPages(browser)), ...links]], ...Object.entries(PEOPLE)] as const) {
    const wanted = screens.filter(([name]) => `${person}-${name}`.includes(only));
    if (wanted.length === 0) continue;
    const page = person === "anybody" ? await visitor(browser) : await signedIn(browser, person);
    page.setDefaultTimeout(8000);
    for (const screen of wanted) {
      const done = await take(page, person, screen).then(() => "", (error: Error) => error.message.split("\n")[0]);
      console.log(`${person}-${screen[0]}${done && `: not taken. ${done}`}`);
      if (done) process.exitCode = 1;
    }
  }
}

await atTheDemo(takeAll);
