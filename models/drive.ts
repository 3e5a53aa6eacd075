import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, text, time, whole } from "./columns";

export class Drive extends Model<InferAttributes<Drive>, InferCreationAttributes<Drive>> {
  declare id: string;
  declare caseId: string;
  declare position: number;
  declare partNumber: CreationOptional<string | null>;
  declare model: CreationOptional<string | null>;
  declare serial: CreationOptional<string | null>;
  declare interface: CreationOptional<string | null>;
  declare createdAt: Date;
}

export function initDrive(sequelize: Sequelize): void {
  Drive.init({
    id: id(),
    caseId: reference(),
    position: whole(),
    partNumber: text(120, true),
    model: text(120, true),
    serial: text(120, true),
    interface: text(60, true),
    createdAt: time(),
  }, { sequelize, modelName: "Drive", tableName: "drives" });
}
