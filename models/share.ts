import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, text, time, bytes } from "./columns";

export class Share extends Model<InferAttributes<Share>, InferCreationAttributes<Share>> {
  declare id: string;
  declare caseId: string;
  declare tokenHash: Buffer;
  declare email: string;
  declare createdBy: string;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare openedAt: CreationOptional<Date | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
}

export function initShare(sequelize: Sequelize): void {
  Share.init({
    id: id(),
    caseId: reference(),
    tokenHash: bytes(32),
    email: text(254),
    createdBy: reference(),
    createdAt: time(),
    expiresAt: time(),
    openedAt: time(true),
    withdrawnAt: time(true),
  }, { sequelize, modelName: "Share", tableName: "shares" });
}
