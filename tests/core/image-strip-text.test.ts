import { expect, it } from "vitest";
import { markRow, STRIP_LEGEND, stripRow } from "@/lib/core/image-strip-text";
import { CELLS, stripOf } from "@/lib/core/strip";
import { goldenImage } from "./stream";

it("shows an image as a row of signs, each of which the legend explains", () => {
  const bytes = goldenImage();
  const row = stripRow(stripOf(bytes, { offset: 0, length: bytes.length, cells: CELLS }));
  expect(row).toBe("oooooooooooooooooooooooo........o......oooooooo.................");
  for (const sign of stripRow("bztodn".repeat(43).slice(0, 256), 256)) expect(STRIP_LEGEND).toContain(`${sign} `);
});
it("never hides a gap or data behind fill", () => {
  expect(stripRow(`n${"b".repeat(255)}`, 8)).toBe("?.......");
  expect(stripRow(`${"b".repeat(255)}o`, 8)).toBe(".......o");
});
it("marks where a part differs", () => {
  const cells = new Array<number>(256).fill(0);
  cells[5] = 1;
  cells[255] = 3;
  expect(markRow(cells, 8)).toBe("^      ^");
  expect(markRow(new Array<number>(256).fill(0), 8)).toBe("");
});
