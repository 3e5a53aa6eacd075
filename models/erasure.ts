import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { EraseCause } from "@/lib/core/words";
import { id, longText, reference, text, time, whole } from "./columns";

/** One erasure of a case's images: `erased` and `kept` are JSON lists of `{sha256, sizeBytes, names}`. */
export class Erasure extends Model<InferAttributes<Erasure>, InferCreationAttributes<Erasure>> {
  declare id: string;
  declare caseId: string;
  declare cause: EraseCause;
  declare reason: string;
  declare erased: string;
  declare kept: string;
  /** distinct images of reads, texts and reports of votes among them */
  declare images: number;
  declare photos: number;
  declare bytes: number;
  declare byUserId: string;
  declare at: CreationOptional<Date>;
}

export function initErasure(sequelize: Sequelize): void {
  Erasure.init({
    id: id(),
    caseId: reference(),
    cause: text(10),
    reason: longText(),
    erased: longText(),
    kept: longText(),
    images: whole(),
    photos: whole(),
    bytes: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
    byUserId: reference(),
    at: time(),
  }, { sequelize, modelName: "Erasure", tableName: "erasures" });
}
