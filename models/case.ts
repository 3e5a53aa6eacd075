import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, text, longText, time } from "./columns";

export class Case extends Model<InferAttributes<Case>, InferCreationAttributes<Case>> {
  declare id: string;
  declare ref: string;
  declare customerId: string;
  declare damage: string;
  declare note: CreationOptional<string | null>;
  declare dueOn: CreationOptional<string | null>;
  declare receivedAt: Date;
  declare createdBy: string;
  declare closedAt: CreationOptional<Date | null>;
  declare closedReason: CreationOptional<string | null>;
}

export function initCase(sequelize: Sequelize): void {
  Case.init({
    id: id(),
    ref: text(16),
    customerId: reference(),
    damage: longText(),
    note: longText(true),
    dueOn: { type: DataTypes.DATEONLY, allowNull: true },
    receivedAt: time(),
    createdBy: reference(),
    closedAt: time(true),
    closedReason: longText(true),
  }, { sequelize, modelName: "Case", tableName: "cases" });
}
