import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { Bus, SizeSource } from "@/lib/core/words";
import { id, reference, text, time, whole, yes } from "./columns";

export class Chip extends Model<InferAttributes<Chip>, InferCreationAttributes<Chip>> {
  declare id: string;
  declare boardId: string;
  declare designator: string;
  declare bus: Bus;
  declare sizeBytes: number;
  declare sizeSource: SizeSource;
  declare supplyMillivolts: CreationOptional<number | null>;
  declare package: CreationOptional<string | null>;
  declare marking: CreationOptional<string | null>;
  declare holds: CreationOptional<string | null>;
  /** three bytes that the chip answered to its identification command, as 6 hex digits */
  declare idBytes: CreationOptional<string | null>;
  /** its discoverable parameters as hex, as far as they were read */
  declare sfdp: CreationOptional<string | null>;
  declare needsTransfer: boolean;
  declare pairedWithId: CreationOptional<string | null>;
  /** where it sits on the board's picture, in thousandths from the left and from the top */
  declare placeX: CreationOptional<number | null>;
  declare placeY: CreationOptional<number | null>;
  declare createdAt: Date;
}

export function initChip(sequelize: Sequelize): void {
  Chip.init({
    id: id(),
    boardId: reference(),
    designator: text(16),
    bus: text(12),
    sizeBytes: whole(),
    sizeSource: text(12),
    supplyMillivolts: whole(true),
    package: text(60, true),
    marking: text(120, true),
    holds: text(120, true),
    idBytes: text(6, true),
    sfdp: text(4096, true),
    needsTransfer: yes(true),
    pairedWithId: reference(true),
    placeX: whole(true),
    placeY: whole(true),
    createdAt: time(),
  }, { sequelize, modelName: "Chip", tableName: "chips" });
}
