import { spawnSync } from "node:child_process";
import { describe, expect, it } from "vitest";
import { LOG_KEY, MANIFEST, readmeTxt, SEAL_KEY, SEAL_PROOF, SEAL_SIGNATURE, SEAL_TEXT, TAG_MANIFEST, TAG_SIGNATURE, WORKSHOP_KEYS } from "@/lib/core/bundle-layout";
import { CHECK_SCRIPT } from "@/lib/core/check-script";
import { SIGNED_PREFIX } from "@/lib/core/custody";

describe("the bundle's check.sh", () => {
  it("is read by a POSIX shell and holds nothing but ASCII", () => {
    expect(spawnSync("sh", ["-n"], { input: CHECK_SCRIPT }).status).toBe(0);
    expect(CHECK_SCRIPT).toMatch(/^[\n\x20-\x7e]+$/);
    // what dash doesn't know
    expect(CHECK_SCRIPT).not.toMatch(/\[\[|\blocal\b|<\(|<<<|\bfunction\b/);
  });

  it("knows the files and the prefix by the names that the bundle gives them", () => {
    for (const name of [MANIFEST, TAG_MANIFEST, TAG_SIGNATURE, WORKSHOP_KEYS, LOG_KEY]) expect(CHECK_SCRIPT).toContain(name);
    expect(CHECK_SCRIPT).toContain(JSON.stringify(SIGNED_PREFIX));
  });

  it("cannot check from a place without a bundle's tools or with half a fingerprint", () => {
    expect(spawnSync("sh", ["-s", "--", "abc"], { input: CHECK_SCRIPT, cwd: "/tmp" }).status).toBe(2);
  });
});

describe("the bundle's README", () => {
  it("names each list and key that a person needs to check by hand", () => {
    const text = readmeTxt({ ref: "26-0042", workshop: "Alder Lane", madeAt: "2026-03-12T14:00:00Z", drives: 2, images: 7, twoPersonRule: true, composites: [], seal: 12 });
    for (const name of [MANIFEST, TAG_MANIFEST, TAG_SIGNATURE, LOG_KEY, SEAL_TEXT, SEAL_SIGNATURE, SEAL_KEY, SEAL_PROOF, "seal 12", "check.sh", "openssl pkeyutl -verify"]) expect(text).toContain(name);
    expect(text).toContain("data/drives/N/photos/");
  });
});
