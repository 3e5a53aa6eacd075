import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { BoardRole } from "@/lib/core/words";
import { id, reference, text, longText, time, yes } from "./columns";

export class Board extends Model<InferAttributes<Board>, InferCreationAttributes<Board>> {
  declare id: string;
  declare driveId: string;
  declare role: BoardRole;
  declare boardNumber: string;
  declare revision: CreationOptional<string | null>;
  declare controllerMarking: CreationOptional<string | null>;
  declare motorDriverMarking: CreationOptional<string | null>;
  declare condition: CreationOptional<string | null>;
  declare fitReason: CreationOptional<string | null>;
  /** its unique data lies inside the main controller: there is no chip to move */
  declare dataInController: CreationOptional<boolean>;
  declare createdAt: Date;
}

export function initBoard(sequelize: Sequelize): void {
  Board.init({
    id: id(),
    driveId: reference(),
    role: text(10),
    boardNumber: text(120),
    revision: text(60, true),
    controllerMarking: text(120, true),
    motorDriverMarking: text(120, true),
    condition: longText(true),
    fitReason: longText(true),
    dataInController: yes(false),
    createdAt: time(),
  }, { sequelize, modelName: "Board", tableName: "boards" });
}
