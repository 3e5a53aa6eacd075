import { randomBytes } from "node:crypto";
import { expect } from "@playwright/test";
import { makeNewcomer } from "./support/newcomers";
import { trySignIn } from "./support/station";
import { test } from "./support/test";

const newAddress = () => `2001:db8::${randomBytes(2).toString("hex")}:${randomBytes(2).toString("hex")}`;
const WRONG = "not the password at all";

test("a hundred guesses at once are no way around the limit: a handful is tried, the rest is turned away", async () => {
  const target = await makeNewcomer("technician");
  const address = newAddress();
  const answers = await Promise.all(Array.from({ length: 100 }, () => trySignIn(target.email, WRONG, { address })));
  const tried = answers.filter((answer) => !answer.bytes.includes("error=limited"));
  expect(tried.length).toBeGreaterThan(3);
  expect(tried.length).toBeLessThanOrEqual(8);
  expect((await trySignIn(target.email, target.password, { address })).bytes.toString("utf8")).toContain("error=limited");
  expect((await trySignIn(target.email, target.password, { address: newAddress() })).status).toBe(200);
});

test("an address with other accents is nobody's: it opens no account and gives no second count of guesses", async () => {
  const target = await makeNewcomer("technician");
  const [name, host] = target.email.split("@");
  for (const other of [name.replace("e", "é"), name.replace("e", "ë"), `${name}\u200b`]) {
    const answer = await trySignIn(`${other}@${host}`, target.password, { address: newAddress() });
    expect(answer.status, other).toBe(401);
    expect(answer.cookie).toBe("");
  }
  expect((await trySignIn(target.email.toUpperCase(), target.password, { address: newAddress() })).status).toBe(200);
});
