import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { whole, yes } from "./columns";

export class PolicyRow extends Model<InferAttributes<PolicyRow>, InferCreationAttributes<PolicyRow>> {
  declare id: number;
  declare policyReads: number;
  declare seatings: number;
  declare readBacks: number;
  declare readBackSeatings: number;
  declare twoPersonRule: boolean;
  declare secondFactor: boolean;
  declare shareDays: number;
  declare erasureDays: number;
}

export function initPolicyRow(sequelize: Sequelize): void {
  PolicyRow.init({
    id: { type: DataTypes.TINYINT.UNSIGNED, primaryKey: true },
    policyReads: whole(),
    seatings: whole(),
    readBacks: whole(),
    readBackSeatings: whole(),
    twoPersonRule: yes(true),
    secondFactor: yes(false),
    shareDays: whole(),
    erasureDays: whole(),
  }, { sequelize, modelName: "PolicyRow", tableName: "policies" });
}
