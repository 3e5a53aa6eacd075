import { describe, expect, it } from "vitest";
import { rightsChanges } from "@/scripts/start/rights";

describe("the app's rights", () => {
  const wanted = [{ table: "log", grants: ["SELECT", "INSERT"] }, { table: "reads", grants: ["SELECT", "UPDATE (counted, set_aside_at)"] }];

  it("are given table by table and column by column", () => {
    expect(rightsChanges(wanted, [])).toEqual([
      { kind: "grant", table: "log", what: "SELECT" },
      { kind: "grant", table: "log", what: "INSERT" },
      { kind: "grant", table: "reads", what: "SELECT" },
      { kind: "grant", table: "reads", what: "UPDATE (`counted`)" },
      { kind: "grant", table: "reads", what: "UPDATE (`set_aside_at`)" },
    ]);
  });

  it("lose what nobody meant them to have", () => {
    const present = [
      { table: "log", right: "SELECT", column: null }, { table: "log", right: "INSERT", column: null }, { table: "log", right: "UPDATE", column: null },
      { table: "reads", right: "SELECT", column: null }, { table: "reads", right: "UPDATE", column: "counted" },
      { table: "reads", right: "UPDATE", column: "set_aside_at" }, { table: "old", right: "DELETE", column: null },
    ];
    expect(rightsChanges(wanted, present)).toEqual([
      { kind: "revoke", table: "log", what: "UPDATE" },
      { kind: "revoke", table: "old", what: "DELETE" },
    ]);
  });

  it("refuse a line that cannot be read", () => {
    expect(() => rightsChanges([{ table: "log", grants: ["select everything"] }], [])).toThrow(/not a right/);
  });
});
