import { expect, it } from "vitest";
import { importFields } from "@/lib/schemas/shelf";

it("takes no misspelt field beside a file, so that what was to be tried is never done", () => {
  expect(importFields.parse({ try: "yes", reason: "" })).toEqual({ try: "yes", reason: null });
  const refused = importFields.safeParse({ tried: "yes" });
  expect(refused.error?.issues.map((issue) => issue.message)).toEqual(["Beside the file only the fields try and reason are taken. Leave the others out."]);
  expect(importFields.safeParse({ try: "perhaps" }).error?.issues[0].message).toBe("Say whether this is only tried: yes or no.");
});
