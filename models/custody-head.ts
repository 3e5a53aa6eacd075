import { type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, text, whole, bytes } from "./columns";

export class CustodyHead extends Model<InferAttributes<CustodyHead>, InferCreationAttributes<CustodyHead>> {
  declare chainId: string;
  declare seq: number;
  declare hash: Buffer;
  declare at: string;
}

export function initCustodyHead(sequelize: Sequelize): void {
  CustodyHead.init({
    chainId: { ...id() },
    seq: whole(),
    hash: bytes(32),
    at: text(27),
  }, { sequelize, modelName: "CustodyHead", tableName: "custody_heads" });
}
