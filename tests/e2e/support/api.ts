import { expect, type Page } from "@playwright/test";

/** Calls of the API with the page's own sign-in, for what a test only needs to begin with. */
async function post<T>(page: Page, path: string, data: object): Promise<T> {
  const response = await page.request.post(path, { data, headers: { origin: new URL(page.url()).origin } });
  expect(response.status(), `${path}: ${await response.text()}`).toBe(201);
  return (await response.json()) as T;
}

/** A case with one drive, both boards and a pair of chips. */
export async function makePair(page: Page, { customer, sizeBytes, email = "bench@oddreads.example" }: { customer: string; sizeBytes: number; email?: string }): Promise<{ caseId: string; chipId: string; donorChipId: string }> {
  const made = await post<{ id: string }>(page, "/api/cases", { customer: { name: customer, email }, damage: "Power surge" });
  const drive = await post<{ id: string }>(page, `/api/cases/${made.id}/drives`, { partNumber: "PN 9001-0001-A" });
  const board = { boardNumber: "BX 90-0001", revision: "rev A" };
  const original = await post<{ id: string }>(page, `/api/drives/${drive.id}/boards`, { role: "original", ...board });
  const donor = await post<{ id: string }>(page, `/api/drives/${drive.id}/boards`, { role: "donor", ...board });
  const facts = { designator: "U3", bus: "spi", sizeBytes, sizeSource: "marking", supplyMillivolts: 3300 };
  const chip = await post<{ id: string }>(page, `/api/boards/${original.id}/chips`, facts);
  const donorChip = await post<{ id: string }>(page, `/api/boards/${donor.id}/chips`, { ...facts, pairedWith: chip.id });
  return { caseId: made.id, chipId: chip.id, donorChipId: donorChip.id };
}
