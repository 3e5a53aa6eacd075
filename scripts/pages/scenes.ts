import type { Browser, Page } from "@playwright/test";
import { openChip, pathFor, signedIn, visitor } from "../pictures/demo";

export interface Scene {
  name: string;
  page: Page;
  address: string;
  /** KB of JavaScript above the empty page that are asked for at most */
  mostKb?: number;
}

const addressOf = (page: Page) => new URL(page.url()).pathname;

/** Where the figures are taken: the pages that customers, technicians, leads and auditors see most. */
export async function scenes(browser: Browser): Promise<Scene[]> {
  const [customer, mira, ines, rhys] = [await visitor(browser), await signedIn(browser, "mira"), await signedIn(browser, "ines"), await signedIn(browser, "rhys")];
  await openChip(mira, "Harrow & Finch Surveyors", "U3");
  const chip = addressOf(mira);
  await mira.getByRole("link", { name: /^Case \d/ }).first().click();
  await mira.waitForURL(/\/cases\/[0-9a-f-]{36}$/);
  const work = addressOf(mira);
  await mira.getByRole("link", { name: /^Custody log, \d+ entries$/ }).first().click();
  await mira.waitForURL(/\/custody$/);
  const custody = addressOf(mira);
  await openChip(ines, "Halden Ropeworks", "U3");
  const decided = addressOf(ines);
  return [
    { name: "Summary", page: customer, address: await pathFor("jory.kemble@kemble.example", "summary"), mostKb: 25 },
    { name: "Request form", page: customer, address: "/request" },
    { name: "Check a bundle", page: customer, address: "/verify" },
    { name: "Help, how to read", page: customer, address: "/help/reads" },
    { name: "Sign-in", page: customer, address: "/sign-in" },
    { name: "Bench", page: mira, address: "/bench" },
    { name: "Chip with 3 reads", page: mira, address: chip, mostKb: 115 },
    { name: "Compare", page: mira, address: `${chip}/compare` },
    { name: "Decision sheet", page: ines, address: `${decided}/decision` },
    { name: "Case", page: mira, address: work },
    { name: "Drive", page: mira, address: custody.replace(/\/custody$/, "") },
    { name: "Custody log", page: mira, address: custody },
    { name: "Donor shelf", page: mira, address: "/shelf" },
    { name: "Audit", page: rhys, address: "/audit" },
  ];
}
