import { type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, text, time, whole } from "./columns";

/** When a chain was last checked as a whole, and what was found; written by the check, read by the audit pages. */
export class ChainCheck extends Model<InferAttributes<ChainCheck>, InferCreationAttributes<ChainCheck>> {
  declare chainId: string;
  declare checkedAt: Date;
  declare entries: number;
  declare findings: number;
  declare firstFinding: string | null;
}

export function initChainCheck(sequelize: Sequelize): void {
  ChainCheck.init({
    chainId: id(),
    checkedAt: time(),
    entries: whole(),
    findings: whole(),
    firstFinding: text(500, true),
  }, { sequelize, modelName: "ChainCheck", tableName: "chain_checks" });
}
