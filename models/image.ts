import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { ImageFacts } from "@/lib/core/inspect";
import type { EraseCause } from "@/lib/core/words";
import { text, time, whole, bytes } from "./columns";

export class Image extends Model<InferAttributes<Image>, InferCreationAttributes<Image>> {
  declare sha256: Buffer;
  declare sizeBytes: number;
  declare crc32: number;
  declare facts: ImageFacts;
  declare engineVersion: CreationOptional<string>;
  declare state: CreationOptional<"sound" | "damaged" | "missing" | "erased">;
  declare storedAt: Date;
  /** when the stored bytes were last read whole and found equal to their digest, or not; null since they were stored */
  declare checkedAt: CreationOptional<Date | null>;
  /** when its bytes were given up, and why; null while it is stored */
  declare erasedAt: CreationOptional<Date | null>;
  declare erasedCause: CreationOptional<EraseCause | null>;
}

export function initImage(sequelize: Sequelize): void {
  Image.init({
    sha256: { ...bytes(32), primaryKey: true },
    sizeBytes: whole(),
    crc32: whole(),
    facts: { type: DataTypes.JSON, allowNull: false },
    engineVersion: { ...text(16), defaultValue: "1" },
    state: { ...text(10), defaultValue: "sound" },
    storedAt: time(),
    checkedAt: time(true),
    erasedAt: time(true),
    erasedCause: text(10, true),
  }, { sequelize, modelName: "Image", tableName: "images" });
}
