import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { AsSent } from "@/lib/core/words";
import { id, longText, reference, text, time } from "./columns";

/** The parcel as it came, beside what was asked for. */
export class Receipt extends Model<InferAttributes<Receipt>, InferCreationAttributes<Receipt>> {
  declare id: string;
  declare caseId: string;
  declare carrier: CreationOptional<string | null>;
  declare tracking: CreationOptional<string | null>;
  declare sealAsSent: AsSent;
  declare sealNumber: CreationOptional<string | null>;
  declare smallBoard: AsSent;
  declare parcelCondition: string;
  declare accessories: CreationOptional<string | null>;
  declare differs: CreationOptional<string | null>;
  declare byUserId: string;
  declare at: Date;
}

export function initReceipt(sequelize: Sequelize): void {
  Receipt.init({
    id: id(),
    caseId: reference(),
    carrier: text(120, true),
    tracking: text(120, true),
    sealAsSent: text(4),
    sealNumber: text(80, true),
    smallBoard: text(4),
    parcelCondition: longText(),
    accessories: longText(true),
    differs: longText(true),
    byUserId: reference(),
    at: time(),
  }, { sequelize, modelName: "Receipt", tableName: "receipts" });
}
