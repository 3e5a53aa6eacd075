import { execFileSync } from "node:child_process";
import { mkdirSync, readdirSync, rmSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import { type PaperName, PAPERS } from "@/lib/core/paper";

const MM_A_POINT = 25.4 / 72;
/** Points that a printer's page may differ from the paper by rounding. */
const SLACK_MM = 0.6;

export interface Printout {
  pages: number;
  /** a picture of each page */
  pictures: string[];
  text: string;
}

/** `name-1.png`, `name-2.png`, in order. */
const pictured = (folder: string, name: string) => readdirSync(folder).filter((one) => one.startsWith(`${name}-`) && /^\d+\.png$/.test(one.slice(name.length + 1))).sort();

/** Prints what the page shows as a PDF of the page's own paper, holds pages and size against it, and pictures each page. */
export async function printed(page: Page, paper: PaperName, folder: string, name: string, pages?: number): Promise<Printout> {
  const out = process.env.PRINT_PICTURES ?? folder;
  mkdirSync(out, { recursive: true });
  await page.evaluate(() => document.fonts.ready);
  const file = path.join(out, `${name}.pdf`);
  await page.pdf({ path: file, preferCSSPageSize: true, printBackground: false });
  const info = execFileSync("pdfinfo", ["-f", "1", "-l", "99", file], { encoding: "utf8" });
  const count = Number(/^Pages:\s+(\d+)/m.exec(info)?.[1]);
  const sizes = [...info.matchAll(/^Page\s+\d+ size:\s+([\d.]+) x ([\d.]+) pts/gm)].map(([, w, h]) => [Number(w) * MM_A_POINT, Number(h) * MM_A_POINT]);
  expect(sizes).toHaveLength(count);
  const { width, height } = PAPERS[paper];
  for (const [w, h] of sizes) {
    expect(Math.abs(w - width), `${name} is ${w} mm wide`).toBeLessThan(SLACK_MM);
    expect(Math.abs(h - height), `${name} is ${h} mm high`).toBeLessThan(SLACK_MM);
  }
  if (pages !== undefined) expect(count, `pages of ${name}`).toBe(pages);
  for (const old of pictured(out, name)) rmSync(path.join(out, old));
  execFileSync("pdftoppm", ["-r", paper.includes("x") ? "300" : "150", "-png", file, path.join(out, name)]);
  const pictures = pictured(out, name).map((one) => path.join(out, one));
  expect(pictures).toHaveLength(count);
  return { pages: count, pictures, text: execFileSync("pdftotext", ["-layout", file, "-"], { encoding: "utf8" }) };
}

/** What a scanner reads off the printed page. */
export const scanned = (picture: string): string => execFileSync("zbarimg", ["--raw", "-q", "-Sdisable", "-Sqrcode.enable", picture], { encoding: "utf8" }).trim();

/** Names of parts of a sheet that stick out of it or of their box, laid out as for the printer. */
export async function stickingOut(page: Page): Promise<string[]> {
  await page.emulateMedia({ media: "print" });
  const out = await page.evaluate(() => [...document.querySelectorAll<HTMLElement>(".printed")].flatMap((sheet) => {
    const edge = sheet.getBoundingClientRect();
    const fixed = sheet.classList.contains("exact");
    return [...sheet.querySelectorAll<HTMLElement>("p, dd, dt, h1, h2, b, li, td, th, span, i, svg")].filter((part) => {
      const box = part.getBoundingClientRect();
      if (box.width === 0 || part.closest(".void-mark")) return false;
      const right = box.right > edge.right + 0.5 || box.left < edge.left - 0.5;
      const below = fixed && (box.bottom > edge.bottom + 0.5 || box.top < edge.top - 0.5);
      const inside = part instanceof HTMLElement && getComputedStyle(part).display !== "inline" && part.scrollWidth > part.clientWidth + 1 && part.clientWidth > 0;
      return right || below || inside;
    }).map((part) => `${part.tagName.toLowerCase()}: ${part.textContent?.slice(0, 60) ?? ""}`);
  }));
  await page.emulateMedia({ media: null });
  return out;
}
