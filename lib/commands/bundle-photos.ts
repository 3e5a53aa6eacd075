import { boardLabel, casePhotoPath, drivePhotoPath } from "@/lib/core/bundle-layout";
import { type PhotoType, TYPE_ENDING } from "@/lib/core/photo-kind";
import type { EraseCause } from "@/lib/core/words";
import { erasedViews } from "@/lib/queries/erased-views";
import type { People } from "@/lib/queries/people";
import { type Board, type Chip, type Drive, Image, Photo, ShelfBoard, type Transaction } from "@/models";
import type { BundleImage } from "./bundle-case";

export interface BundlePhotos {
  ofCase: PhotoRecord[];
  /** by the drive's id */
  ofDrive: Map<string, PhotoRecord[]>;
  files: BundleImage[];
}

/**
 * A photo as case.json has it. No key is named "id" or "path": check.sh reads those line by line as reads and approvals.
 * The order of the keys is part of that too.
 */
export interface PhotoRecord {
  photo: string;
  /** null: the original is damaged, missing or erased, so it is not in the bundle */
  file: string | null;
  erased?: { at: string; cause: EraseCause };
  sha256: string;
  sizeBytes: number;
  kind: string;
  mediaType: string;
  of: string;
  originalFileName: string;
  caption: string | null;
  pixels: string | null;
  saysWhereItWasTaken: boolean;
  storedAt: string;
  /** "customer" where they came with the request */
  by: { id: string; name: string; role: string } | "customer";
}

interface Rows {
  caseId: string;
  drives: readonly Drive[];
  boards: readonly Board[];
  chips: readonly Chip[];
  who: People;
}

/** Photos and documents of a case and all that lies in it, each under a name of ours, in a fixed order. */
export async function bundlePhotos(tx: Transaction, { caseId, drives, boards, chips, who }: Rows): Promise<BundlePhotos> {
  const at = { transaction: tx };
  const shelf = await ShelfBoard.findAll({ attributes: ["id", "takenBoardId"], where: { takenBoardId: boards.map((board) => board.id) }, ...at });
  const rows = [
    ...(await Photo.findAll({ where: { caseId }, order: ["storedAt", "id"], ...at })),
    ...(await Photo.findAll({ where: { subjectType: "shelf-board", subjectId: shelf.map((one) => one.id) }, order: ["storedAt", "id"], ...at })),
  ];
  const images = await Image.findAll({ attributes: ["sha256", "state", "erasedAt", "erasedCause"], where: { sha256: rows.map((row) => row.sha256) }, ...at });
  const sound = new Set(images.filter((image) => image.state === "sound").map((image) => image.sha256.toString("hex")));
  const erased = erasedViews(images);
  const result: BundlePhotos = { ofCase: [], ofDrive: new Map(), files: [] };
  const take = (subject: string, of: string, into: PhotoRecord[], path: (number: number, ending: string) => string) => {
    for (const [i, row] of rows.filter(({ subjectId }) => subjectId === subject).entries()) {
      const sha256 = row.sha256.toString("hex");
      const gone = erased.get(sha256);
      const file = sound.has(sha256) ? path(i + 1, TYPE_ENDING[row.mediaType as PhotoType] ?? "bin") : null;
      if (file) result.files.push({ path: file, sha256, sizeBytes: row.sizeBytes });
      into.push({
        photo: row.id, file, sha256, sizeBytes: row.sizeBytes, kind: row.kind, mediaType: row.mediaType, of, originalFileName: row.fileName, caption: row.caption ?? null,
        pixels: row.width ? `${row.width}x${row.height}` : null, saysWhereItWasTaken: Boolean(row.hadLocation), storedAt: row.storedAt.toISOString(), by: row.byUserId ? who(row.byUserId) : "customer", ...(gone ? { erased: { at: gone.at, cause: gone.cause } } : {}),
      });
    }
  };
  take(caseId, "the case", result.ofCase, casePhotoPath);
  for (const [i, drive] of drives.entries()) {
    const list: PhotoRecord[] = [];
    result.ofDrive.set(drive.id, list);
    const inDrive = (place: string[]) => (number: number, ending: string) => drivePhotoPath(i + 1, place, number, ending);
    take(drive.id, "the drive", list, inDrive(["drive"]));
    const mine = boards.filter((board) => board.driveId === drive.id);
    for (const board of mine) {
      const label = boardLabel(board.role, mine.filter((one) => one.role === board.role).indexOf(board) + 1);
      const name = `the ${board.role} board ${board.boardNumber}`;
      take(board.id, name, list, inDrive([label]));
      const before = shelf.find((one) => one.takenBoardId === board.id);
      if (before) take(before.id, `${name}, on the shelf`, list, inDrive([label, "shelf"]));
      for (const chip of chips.filter((one) => one.boardId === board.id)) take(chip.id, `${chip.designator} of ${name}`, list, inDrive([label, chip.designator]));
    }
  }
  return result;
}
