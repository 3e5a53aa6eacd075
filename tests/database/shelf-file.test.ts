import { beforeAll, describe, expect, it } from "vitest";
import { changeShelfBoard } from "@/lib/commands/change-shelf-board";
import { createCase } from "@/lib/commands/create-case";
import { importShelf } from "@/lib/commands/import-shelf";
import { readShelfCsv } from "@/lib/commands/read-shelf-csv";
import { recordShelfBoard } from "@/lib/commands/record-shelf-board";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { shelfBoard, shelfList } from "@/lib/queries/shelf";
import { chipsFrom, chipsText, shelfFile } from "@/lib/queries/shelf-file";
import { shelfInput, shelfListInput } from "@/lib/schemas/shelf";
import { CustodyEntry, ShelfBoard } from "@/models";
import { lastEntry, makeUser, refusalOf } from "../support/factory";

let technician: Actor;
let lead: Actor;
let turn = 0;
beforeAll(async () => {
  technician = await makeUser("technician");
  lead = await makeUser("lead");
});
const freshNumber = () => `BX ${Date.now().toString(36)}-f${(turn += 1)}`;
const bytes = (text: string) => new TextEncoder().encode(text);
const bring = (text: string | Uint8Array, tryOnly = false, fileName = "shelf.csv") => importShelf(technician, { bytes: typeof text === "string" ? bytes(text) : text, fileName, tryOnly, reason: null });
const file = async (q: string, state = "") => new Response((await shelfFile(technician, shelfListInput.parse({ q, state }))).stream).text();
const find = async (q: string) => (await shelfList(technician, shelfListInput.parse({ q, sort: "number" }))).items;
const put = (input: Record<string, unknown>) => recordShelfBoard(technician, shelfInput.parse(input));

describe("what is saved and brought back", () => {
  it("changes nothing: formulas, apostrophes, quotes, semicolons, several lines, every state", async () => {
    const boardNumber = freshNumber();
    const made = await createCase(technician, { customer: { name: "Oakhanger Press", email: "post@oakhanger.example" }, damage: "Water" });
    await put({ boardNumber, revision: "=1+1", origin: "-lot 7", place: "@home", note: "'=sum(A1)", condition: "two\nlines; \"quoted\", and more" });
    await put({ boardNumber, controllerMarking: "＋wide", note: "''+x", place: "'plain", reservedFor: made.ref, chips: [{ designator: "U3", bus: "spi", sizeBytes: 524_288, package: "SO;8", marking: "A,\"7\" 0442" }, { designator: "U12" }] });
    const retired = await put({ boardNumber, note: "crlf\r\nline" });
    await changeShelfBoard(lead, retired.id, { changes: { retired: true }, reason: "-broken" });
    const text = await file(boardNumber);
    expect(text.split("\r\n")[0]).toBe("number,board number,revision,controller marking,motor driver marking,chips,origin,condition,place,note,reserved for,state,taken for,retired because");
    expect(text).toContain(",'=1+1,");
    expect(text).toContain(",''=sum(A1),");
    const entries = await CustodyEntry.count({ where: { chainId: WORKSHOP_CHAIN } });
    expect(await bring(text)).toEqual({ done: true, counts: { new: 0, changed: 0, same: 3, refused: 0 }, lines: [], left: 0 });
    expect(await CustodyEntry.count({ where: { chainId: WORKSHOP_CHAIN } })).toBe(entries);
    // and as new boards of another house: the same facts
    for (const state of ["on-shelf", "reserved"]) {
      const copy = (await file(boardNumber, state)).replace(/^D-\d+,/gm, ",").replaceAll(boardNumber, `${boardNumber}x`);
      expect((await bring(copy)).counts).toEqual({ new: 1, changed: 0, same: 0, refused: 0 });
    }
    const facts = (rows: Awaited<ReturnType<typeof find>>) => rows.filter((row) => row.state !== "retired").map(({ revision, controllerMarking, chips, origin, condition, place, note }) => ({ revision, controllerMarking, chips, origin, condition, place, note }));
    expect(facts(await find(`${boardNumber}x`))).toEqual(facts((await find(boardNumber)).filter((row) => row.boardNumber === boardNumber)));
  });

  it("reads chips back as they were written", () => {
    const chips = [{ designator: "U3", bus: "spi" as const, sizeBytes: 524_288, package: "a;b", marking: "c\"d, e" }, { designator: "U12", bus: null, sizeBytes: null, package: null, marking: null }];
    expect(chipsText(chips)).toBe("U3,spi,524288,\"a;b\",\"c\"\"d, e\";U12");
    expect(shelfInput.parse({ boardNumber: "x", chips: chipsFrom(chipsText(chips)) }).chips).toEqual(chips);
    expect(shelfInput.parse({ boardNumber: "x", chips: chipsFrom(" u3 , SPI, 512 KiB ; U4,,1 MiB ") }).chips).toMatchObject([{ designator: "U3", bus: "spi", sizeBytes: 524_288 }, { bus: null, sizeBytes: 1_048_576 }]);
    expect(chipsText([])).toBe("");
    expect(chipsFrom("")).toEqual([]);
  });
});

describe("an import", () => {
  it("says what each line would do, then does all of it, each with its entry", async () => {
    const boardNumber = freshNumber();
    const old = await put({ boardNumber, place: "Drawer 1", revision: "rev B" });
    const text = `number;board number;place;chips\r\n${old.number};${boardNumber};Drawer 9;\r\n;${boardNumber};"Box ""7""";U3,spi,512 KiB\r\n`;
    const tried = await bring(`\uFEFF${text}`, true);
    expect(tried).toMatchObject({ done: false, counts: { new: 1, changed: 1, same: 0, refused: 0 }, lines: [{ line: 3, result: "new", number: null }, { line: 2, result: "changed", number: old.number, sentence: "place from Drawer 1 to Drawer 9." }] });
    expect(await find(boardNumber)).toHaveLength(1);
    const done = await bring(text, false, "list.csv");
    expect(done.counts).toEqual(tried.counts);
    const rows = await find(boardNumber);
    expect(rows.find((row) => row.number === old.number)).toMatchObject({ place: "Drawer 9", revision: "rev B" });
    expect(rows.find((row) => row.number === done.lines[0].number)).toMatchObject({ place: "Box \"7\"", chips: [{ designator: "U3", sizeBytes: 524_288 }] });
    expect((await shelfBoard(technician, old.id)).history[0].sentence).toMatch(/From line 2 of list\.csv\./);
    expect(await lastEntry(WORKSHOP_CHAIN, "shelf.recorded")).toMatchObject({ boardNumber });
  });

  it("is all or nothing: one line that can't be taken, and no other is", async () => {
    const boardNumber = freshNumber();
    const gone = await put({ boardNumber });
    await changeShelfBoard(lead, gone.id, { changes: { retired: true }, reason: "Broken." });
    const text = `number,board number,chips,reserved for,state\n,${boardNumber},,,\n,,,,\nD-999999,${boardNumber},,,\nx1,${boardNumber},,,\n,${boardNumber},"U3,usb,5",,\n,${boardNumber},,99-9999,\n,${boardNumber},,,Taken\n${gone.number},${boardNumber}2,,,\n${gone.number},${boardNumber},,,\n,${boardNumber},"U3,spi,1;U3,i2c,2",,\n,${"y".repeat(121)},,,\n,a,b\n`;
    const tried = await bring(text, true);
    expect(tried.counts).toEqual({ new: 1, changed: 0, same: 0, refused: 10 });
    expect(tried.lines.map(({ line, sentence }) => `${line} ${sentence}`).slice(0, 10)).toEqual([
      "4 There is no D-999999 on the shelf. Leave the number empty for a new board; it gets the next one.",
      "5 “x1” is no number of the shelf. Numbers look like D-0012; leave it empty for a new board.",
      "6 chips, number 1, bus: A bus is one of spi, i2c, microwire, other.",
      "7 Reserved for: there is no case 99-9999.",
      expect.stringMatching(/^8 The column “state” says “Taken”/),
      expect.stringMatching(/^9 D-\d+ is retired\. Bring it back/),
      expect.stringMatching(/^10 D-\d+ stands in line 9 already/),
      "11 chips: Two chips have the same designator.",
      "12 board number: At most 120 characters.",
      "13 It has 3 cells, the header has another number. Look for a comma or a quote too many.",
    ]);
    const before = await ShelfBoard.count();
    const refusal = await refusalOf(bring(text));
    expect(refusal).toMatchObject({ code: "does-not-fit", detail: expect.stringMatching(/^10 lines can't be taken, so nothing was changed\. Line 4: /) });
    expect(await ShelfBoard.count()).toBe(before);
  });

  it("refuses hostile files with a sentence", async () => {
    const why = async (text: string | Uint8Array) => (await refusalOf(bring(text, true))).detail;
    expect(await why("")).toMatch(/empty/);
    expect(await why("board number\n")).toMatch(/nothing below it/);
    expect(await why("board number,colour\nx,y\n")).toMatch(/“colour” is none/);
    expect(await why("revision\nx\n")).toMatch(/“board number” is missing/);
    expect(await why("board number,board number\nx,y\n")).toMatch(/twice/);
    expect(await why("board number\n\"x\n")).toMatch(/never closed/);
    expect(await why("board number\na \"b\" c\n")).toMatch(/^Line 2: a quote stands in the middle/);
    expect(await why(Uint8Array.from([0x62, 0xff, 0xfe]))).toMatch(/not UTF-8/);
    expect(await why(Uint8Array.from([0xff, 0xfe, 0x62, 0]))).toMatch(/UTF-16/);
    expect(await why(`board number\n${"x\n".repeat(10_001)}`)).toMatch(/more than 10,000 rows/);
    expect(await why(`board number\n${"x\n".repeat(1001)}`)).toMatch(/1,000 at most/);
    expect(await why(`board number\n"${"y".repeat(70_000)}"\n`)).toMatch(/longer than 64 KiB/);
    expect(await refusalOf(bring(new Uint8Array(10 * 1_048_576 + 1), true))).toMatchObject({ code: "too-large" });
    // ten million cells, of which the first line's are looked at
    expect(await why(`board number\n${`${",".repeat(60_000)}x\n`.repeat(170)}`)).toMatch(/^Line 2 has 60,001 cells/);
    expect(await refusalOf(importShelf(await makeUser("auditor"), { bytes: bytes("board number\nx\n"), fileName: "", tryOnly: true, reason: null }))).toMatchObject({ code: "forbidden" });
  });

  it("tells lines by where they begin, whatever ends them", () => {
    const rows = readShelfCsv(bytes("board number,note\r\na,\"one\r\ntwo\r\nthree\"\r\n\r\nb,x\r\n"));
    expect(rows).toMatchObject([{ line: 2, cells: { note: "one\ntwo\nthree" } }, { line: 6, cells: { "board number": "b" } }]);
    expect(readShelfCsv(bytes("board number\tplace\na\tb\n"))).toMatchObject([{ cells: { place: "b" } }]);
  });
});
