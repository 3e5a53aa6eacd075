import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { createElement } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import sharp from "sharp";
import { afterAll, describe, expect, it } from "vitest";
import { Qr } from "@/components/print/qr";
import { withCheck } from "@/lib/core/case-number";

const folder = mkdtempSync(path.join(tmpdir(), "twinread-qr-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const drawn = (text: string) => renderToStaticMarkup(createElement(Qr, { text, size: "20mm" }));

/** Draws the code as a picture, `pixels` wide, and has zbarimg read it. */
async function readBack(text: string, pixels: number): Promise<string> {
  const file = path.join(folder, `${pixels}.png`);
  const svg = drawn(text).replace("<svg ", '<svg xmlns="http://www.w3.org/2000/svg" ').replace("20mm", String(pixels)).replace("20mm", String(pixels));
  writeFileSync(file, await sharp(Buffer.from(svg), { density: 72 }).resize(pixels, pixels, { kernel: "nearest" }).png().toBuffer());
  return execFileSync("zbarimg", ["--quiet", "--raw", "-Sdisable", "-Sqrcode.enable", file], { encoding: "utf8", stdio: ["ignore", "pipe", "ignore"] }).trimEnd();
}

describe("a case number as a square code", () => {
  it("is read back, character by character, small and large", async () => {
    for (const ref of ["26-0001", "26-0183", "26-9999", "99-123456"]) {
      const text = withCheck(ref);
      expect(await readBack(text, 290)).toBe(text);
      expect(await readBack(text, 87)).toBe(text);
    }
  });

  it("has four modules of white around it and is black on white whatever the theme", () => {
    const svg = drawn("26-0183.4");
    expect(svg).toContain('viewBox="-4 -4 29 29"');
    expect(svg).toContain('fill="#fff"');
    expect(svg).not.toContain("var(");
  });

  it("puts nothing else than the number into the label for who can't see it", () => {
    expect(drawn("26-0183.4")).toContain('aria-label="26-0183.4 as a square code"');
  });
});
