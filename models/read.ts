import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { Format, Method, Stage } from "@/lib/core/words";
import { id, reference, text, longText, time, whole, yes, bytes } from "./columns";

export class Read extends Model<InferAttributes<Read>, InferCreationAttributes<Read>> {
  declare id: string;
  declare chipId: string;
  declare stage: Stage;
  declare number: number;
  declare seating: number;
  declare transferId: CreationOptional<string | null>;
  declare method: CreationOptional<Method | null>;
  declare reader: string;
  declare toolVersion: CreationOptional<string | null>;
  declare adapter: CreationOptional<string | null>;
  declare supplyMillivolts: CreationOptional<number | null>;
  declare supplyUnknown: CreationOptional<boolean>;
  declare clockKilohertz: CreationOptional<number | null>;
  declare controllerHeld: CreationOptional<boolean | null>;
  declare note: CreationOptional<string | null>;
  declare format: Format;
  /** the text file that the image was expanded from, as it came */
  declare sourceSha256: CreationOptional<Buffer | null>;
  declare sourceBase: CreationOptional<number | null>;
  declare sourceFill: CreationOptional<number | null>;
  /** for a composite: how it was made, as JSON (DerivedFacts) */
  declare derived: CreationOptional<string | null>;
  declare fileName: string;
  declare modifiedAt: CreationOptional<Date | null>;
  declare takenAt: CreationOptional<Date | null>;
  declare storedAt: Date;
  declare operatorId: string;
  declare sha256: Buffer;
  declare sizeBytes: number;
  declare crc32: number;
  declare findings: string;
  declare engineVersion: string;
  declare counted: CreationOptional<boolean>;
  declare setAsideReason: CreationOptional<string | null>;
  declare setAsideBy: CreationOptional<string | null>;
  declare setAsideAt: CreationOptional<Date | null>;
}

export function initRead(sequelize: Sequelize): void {
  Read.init({
    id: id(),
    chipId: reference(),
    stage: text(10),
    number: whole(),
    seating: whole(),
    transferId: reference(true),
    method: text(12, true),
    reader: text(120),
    toolVersion: text(120, true),
    adapter: text(120, true),
    supplyMillivolts: whole(true),
    supplyUnknown: yes(false),
    clockKilohertz: whole(true),
    controllerHeld: { type: DataTypes.BOOLEAN, allowNull: true },
    note: longText(true),
    format: text(12),
    sourceSha256: { ...bytes(32, true), field: "source_sha256" },
    sourceBase: { type: DataTypes.BIGINT.UNSIGNED, allowNull: true },
    sourceFill: whole(true),
    derived: longText(true),
    fileName: text(1024),
    modifiedAt: time(true),
    takenAt: time(true),
    storedAt: time(),
    operatorId: reference(),
    sha256: bytes(32),
    sizeBytes: whole(),
    crc32: whole(),
    findings: longText(),
    engineVersion: text(16),
    counted: yes(true),
    setAsideReason: longText(true),
    setAsideBy: reference(true),
    setAsideAt: time(true),
  }, { sequelize, modelName: "Read", tableName: "reads" });
}
