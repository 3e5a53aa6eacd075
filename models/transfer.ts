import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { TransferKind } from "@/lib/core/words";
import { id, reference, text, longText, time } from "./columns";

export class Transfer extends Model<InferAttributes<Transfer>, InferCreationAttributes<Transfer>> {
  declare id: string;
  declare approvalId: string;
  declare chipId: string;
  declare donorChipId: string;
  declare kind: TransferKind;
  declare programmer: CreationOptional<string | null>;
  declare toolVersion: CreationOptional<string | null>;
  declare adapter: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  declare byUserId: string;
  declare at: Date;
}

export function initTransfer(sequelize: Sequelize): void {
  Transfer.init({
    id: id(),
    approvalId: reference(),
    chipId: reference(),
    donorChipId: reference(),
    kind: text(12),
    programmer: text(120, true),
    toolVersion: text(120, true),
    adapter: text(120, true),
    note: longText(true),
    byUserId: reference(),
    at: time(),
  }, { sequelize, modelName: "Transfer", tableName: "transfers" });
}
