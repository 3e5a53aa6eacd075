import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { SealCause } from "@/lib/core/words";
import { bytes, text, time, whole } from "./columns";


export class Seal extends Model<InferAttributes<Seal>, InferCreationAttributes<Seal>> {
  declare number: number;
  /** the signed bytes */
  declare text: Buffer;
  declare sha256: Buffer;
  declare prev: Buffer;
  declare keyId: string;
  declare signature: Buffer;
  declare cause: SealCause;
  declare madeAt: Date;
  declare chains: number;
  /** one line a chain, canonical JSON, in the order of the tree */
  declare leaves: Buffer;
}

export function initSeal(sequelize: Sequelize): void {
  Seal.init({
    number: { ...whole(), primaryKey: true },
    text: { type: DataTypes.BLOB, allowNull: false },
    sha256: bytes(32),
    prev: bytes(32),
    keyId: text(64),
    signature: bytes(64),
    cause: text(20),
    madeAt: time(),
    chains: whole(),
    leaves: { type: DataTypes.BLOB("long"), allowNull: false },
  }, { sequelize, modelName: "Seal", tableName: "seals" });
}
