import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, text, whole, bytes } from "./columns";

export class CustodyEntry extends Model<InferAttributes<CustodyEntry>, InferCreationAttributes<CustodyEntry>> {
  declare chainId: string;
  declare seq: number;
  declare body: Buffer;
  declare hash: Buffer;
  declare prev: Buffer;
  declare keyId: string;
  declare signature: Buffer;
  declare action: string;
}

export function initCustodyEntry(sequelize: Sequelize): void {
  CustodyEntry.init({
    chainId: id(),
    seq: { ...whole(), primaryKey: true },
    body: { type: DataTypes.BLOB("medium"), allowNull: false },
    hash: bytes(32),
    prev: bytes(32),
    keyId: text(64),
    signature: bytes(64),
    action: text(40),
  }, { sequelize, modelName: "CustodyEntry", tableName: "custody_entries" });
}
