import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, text, longText, time, yes, bytes } from "./columns";

export class Approval extends Model<InferAttributes<Approval>, InferCreationAttributes<Approval>> {
  declare id: string;
  declare chipId: string;
  declare donorChipId: string;
  declare sha256: Buffer;
  declare approvedBy: string;
  declare givenAt: Date;
  declare statement: string;
  declare reasons: string;
  declare lookedAt: string;
  declare twoPersonRule: boolean;
  declare revokedAt: CreationOptional<Date | null>;
  declare revokedBy: CreationOptional<string | null>;
  declare revokedCause: CreationOptional<string | null>;
  declare revokedReason: CreationOptional<string | null>;
}

export function initApproval(sequelize: Sequelize): void {
  Approval.init({
    id: id(),
    chipId: reference(),
    donorChipId: reference(),
    sha256: bytes(32),
    approvedBy: reference(),
    givenAt: time(),
    statement: longText(),
    reasons: longText(),
    lookedAt: longText(),
    twoPersonRule: yes(true),
    revokedAt: time(true),
    revokedBy: reference(true),
    revokedCause: text(40, true),
    revokedReason: longText(true),
  }, { sequelize, modelName: "Approval", tableName: "approvals" });
}
