import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, longText, time } from "./columns";

export class ApprovalRequest extends Model<InferAttributes<ApprovalRequest>, InferCreationAttributes<ApprovalRequest>> {
  declare id: string;
  declare chipId: string;
  declare askedBy: string;
  declare askedAt: Date;
  declare message: CreationOptional<string | null>;
  declare sentBackBy: CreationOptional<string | null>;
  declare sentBackAt: CreationOptional<Date | null>;
  declare sentBackReason: CreationOptional<string | null>;
}

export function initApprovalRequest(sequelize: Sequelize): void {
  ApprovalRequest.init({
    id: id(),
    chipId: reference(),
    askedBy: reference(),
    askedAt: time(),
    message: longText(true),
    sentBackBy: reference(true),
    sentBackAt: time(true),
    sentBackReason: longText(true),
  }, { sequelize, modelName: "ApprovalRequest", tableName: "approval_requests" });
}
