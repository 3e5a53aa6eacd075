import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { PhotoKind, PhotoSubject } from "@/lib/core/words";
import { bytes, id, reference, text, time, whole, yes } from "./columns";

/** A photo or document as it was received; its bytes lie in the store under their digest, with a row of `images`. */
export class Photo extends Model<InferAttributes<Photo>, InferCreationAttributes<Photo>> {
  declare id: string;
  declare caseId: CreationOptional<string | null>;
  declare subjectType: PhotoSubject;
  declare subjectId: string;
  declare kind: PhotoKind;
  declare sha256: Buffer;
  declare sizeBytes: number;
  declare mediaType: string;
  declare fileName: string;
  declare caption: CreationOptional<string | null>;
  declare width: CreationOptional<number | null>;
  declare height: CreationOptional<number | null>;
  declare hadLocation: CreationOptional<boolean>;
  declare byUserId: CreationOptional<string | null>;
  declare storedAt: Date;
}

export function initPhoto(sequelize: Sequelize): void {
  Photo.init({
    id: id(),
    caseId: reference(true),
    subjectType: text(12),
    subjectId: reference(),
    kind: text(10),
    sha256: bytes(32),
    sizeBytes: whole(),
    mediaType: text(40),
    fileName: text(255),
    caption: text(300, true),
    width: whole(true),
    height: whole(true),
    hadLocation: yes(false),
    byUserId: reference(true),
    storedAt: time(),
  }, { sequelize, modelName: "Photo", tableName: "photos" });
}
