import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { Encryption } from "@/lib/core/words";
import { id, reference, text, time, whole } from "./columns";

export class Drive extends Model<InferAttributes<Drive>, InferCreationAttributes<Drive>> {
  declare id: string;
  declare caseId: string;
  declare position: number;
  declare partNumber: CreationOptional<string | null>;
  declare model: CreationOptional<string | null>;
  declare serial: CreationOptional<string | null>;
  declare interface: CreationOptional<string | null>;
  declare encryption: CreationOptional<Encryption | null>;
  declare capacity: CreationOptional<string | null>;
  declare made: CreationOptional<string | null>;
  declare firmware: CreationOptional<string | null>;
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
    encryption: text(10, true),
    capacity: text(40, true),
    made: text(40, true),
    firmware: text(60, true),
    createdAt: time(),
  }, { sequelize, modelName: "Drive", tableName: "drives" });
}
