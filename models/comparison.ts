import { type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { text, longText, bytes } from "./columns";

export class ComparisonRow extends Model<InferAttributes<ComparisonRow>, InferCreationAttributes<ComparisonRow>> {
  declare sha256A: Buffer;
  declare sha256B: Buffer;
  declare engineVersion: string;
  declare result: string;
}

export function initComparisonRow(sequelize: Sequelize): void {
  ComparisonRow.init({
    sha256A: { ...bytes(32), primaryKey: true, field: "sha256_a" },
    sha256B: { ...bytes(32), primaryKey: true, field: "sha256_b" },
    engineVersion: { ...text(16), primaryKey: true },
    result: longText(),
  }, { sequelize, modelName: "ComparisonRow", tableName: "comparisons" });
}
