import { expect, it } from "vitest";
import { benchRows } from "@/lib/queries/bench";
import { store } from "../support/factory";
import { makeWrittenBench } from "../support/bench-steps";

it("a chip to be written again shows the approved image over the read-back that differs, and where; until one equals it", async () => {
  const { technician, chip, image } = await makeWrittenBench();
  const row = async () => (await benchRows(technician)).find((one) => one.chip.id === chip.chipId)!.chip;
  expect((await row()).thumbnail).toMatchObject({ shows: "reads", lane: null, images: [expect.stringMatching(/^.{64}$/)] });
  const back = Buffer.from(image);
  back.fill(0xff, image.length - 1024);
  await store(technician, chip.donorChipId, "after", back, 1);
  const { state, thumbnail } = await row();
  expect(state.state).toBe("failed");
  expect(thumbnail.shows).toBe("read-back");
  expect(thumbnail.images).toHaveLength(2);
  const [written, read] = thumbnail.images;
  // the last eighth came back blank, and only there the two differ
  expect(read).toBe(`${written.slice(0, 56)}${"b".repeat(8)}`);
  expect(thumbnail.lane!.findIndex((n) => n > 0)).toBe(56);
});
