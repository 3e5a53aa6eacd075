import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, longText, reference, text, time } from "./columns";

/** What went back to the customer, and how; `items` is JSON, a list of texts. */
export class CaseReturn extends Model<InferAttributes<CaseReturn>, InferCreationAttributes<CaseReturn>> {
  declare id: string;
  declare caseId: string;
  declare items: string;
  declare toPerson: string;
  declare carrier: CreationOptional<string | null>;
  declare tracking: CreationOptional<string | null>;
  declare sealNumber: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  declare byUserId: string;
  declare at: Date;
}

export function initCaseReturn(sequelize: Sequelize): void {
  CaseReturn.init({
    id: id(),
    caseId: reference(),
    items: longText(),
    toPerson: text(120),
    carrier: text(120, true),
    tracking: text(120, true),
    sealNumber: text(80, true),
    note: longText(true),
    byUserId: reference(),
    at: time(),
  }, { sequelize, modelName: "CaseReturn", tableName: "case_returns" });
}
