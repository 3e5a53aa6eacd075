import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, longText, reference, text, time, whole } from "./columns";

/** A donor board in stock that no drive has taken yet, or the record of one that was taken. `chips` is JSON, see lib/schemas/shelf.ts. */
export class ShelfBoard extends Model<InferAttributes<ShelfBoard>, InferCreationAttributes<ShelfBoard>> {
  declare id: string;
  declare number: number;
  declare boardNumber: string;
  declare revision: CreationOptional<string | null>;
  declare controllerMarking: CreationOptional<string | null>;
  declare motorDriverMarking: CreationOptional<string | null>;
  declare chips: string;
  declare origin: CreationOptional<string | null>;
  declare condition: CreationOptional<string | null>;
  declare place: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  declare reservedCaseId: CreationOptional<string | null>;
  declare takenBoardId: CreationOptional<string | null>;
  declare takenAt: CreationOptional<Date | null>;
  declare retiredAt: CreationOptional<Date | null>;
  declare retiredReason: CreationOptional<string | null>;
  declare createdBy: string;
  declare createdAt: Date;
}

export function initShelfBoard(sequelize: Sequelize): void {
  ShelfBoard.init({
    id: id(),
    number: whole(),
    boardNumber: text(120),
    revision: text(60, true),
    controllerMarking: text(120, true),
    motorDriverMarking: text(120, true),
    chips: longText(),
    origin: text(200, true),
    condition: longText(true),
    place: text(120, true),
    note: longText(true),
    reservedCaseId: reference(true),
    takenBoardId: reference(true),
    takenAt: time(true),
    retiredAt: time(true),
    retiredReason: longText(true),
    createdBy: reference(),
    createdAt: time(),
  }, { sequelize, modelName: "ShelfBoard", tableName: "shelf_boards" });
}
