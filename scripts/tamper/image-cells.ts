import { createHash } from "node:crypto";
import { chmodSync, copyFileSync, linkSync, mkdirSync, readFileSync, renameSync, rmSync, symlinkSync, truncateSync, unlinkSync, writeFileSync } from "node:fs";
import path from "node:path";
import { imageFile } from "@/tests/support/tamper";
import type { Cell } from "./cells";
import type { Scene } from "./scene";

const digest = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
const fileOf = (image: Uint8Array) => imageFile(digest(image).toString("hex"));

/** Does something to drive A's image file, and puts it back afterwards. */
function withImage(name: string, row: string, act: (file: string, scene: Scene) => void): Cell {
  let file = "";
  return {
    attacker: "A6", name, row,
    run(_, scene) {
      file = fileOf(scene.a.image);
      copyFileSync(file, `${file}-kept`);
      chmodSync(file, 0o640);
      act(file, scene);
      return Promise.resolve();
    },
    undo() {
      rmSync(file, { force: true });
      renameSync(`${file}-kept`, file);
    },
  };
}

const rewritten = (name: string, row: string, change: (content: Buffer) => Buffer) => withImage(name, row, (file) => writeFileSync(file, change(readFileSync(file))));

function flipped(place: (length: number) => number) {
  return (content: Buffer) => {
    content[place(content.length)] ^= 1;
    return content;
  };
}

/** With the database as well: file, image's row, reads and approvals all say the new digest; only the log does not. */
function together(): Cell {
  const content = Buffer.alloc(8192, 0x55);
  return {
    attacker: "A6", name: "file, image's row and read's row together (with A3)", row: "",
    async run(db, scene) {
      const file = fileOf(content);
      mkdirSync(path.dirname(file), { recursive: true });
      copyFileSync(fileOf(scene.a.image), file);
      chmodSync(file, 0o640);
      writeFileSync(file, content);
      await db.query("SET foreign_key_checks = 0");
      for (const table of ["images", "`reads`", "approvals"]) await db.query(`UPDATE ${table} SET sha256 = ? WHERE sha256 = ?`, [digest(content), digest(scene.a.image)]);
      await db.query("SET foreign_key_checks = 1");
    },
    undo: () => rmSync(fileOf(content), { force: true }),
  };
}

/** Write access to the images' files. */
export function imageCells(): Cell[] {
  return [
    rewritten("one bit of an image", "first", flipped(() => 0)), rewritten("one bit of an image", "middle", flipped((n) => n >> 1)), rewritten("one bit of an image", "last", flipped((n) => n - 1)),
    rewritten("one byte cut off", "", (content) => content.subarray(0, -1)), rewritten("one byte added", "", (content) => Buffer.concat([content, Buffer.from([0])])),
    rewritten("all zero, same length", "", (content) => Buffer.alloc(content.length)), withImage("image removed", "", (file) => unlinkSync(file)), withImage("image emptied", "", (file) => truncateSync(file)),
    withImage("another image's bytes in its place", "", (file, { b }) => writeFileSync(file, readFileSync(fileOf(b.image)))),
    withImage("a link to another image in its place", "", (file, { b }) => {
      unlinkSync(file);
      symlinkSync(fileOf(b.image), file);
    }),
    withImage("the same file as another image", "", (file, { b }) => {
      unlinkSync(file);
      linkSync(fileOf(b.image), file);
    }),
    together(),
  ];
}
