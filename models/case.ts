import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { ClosedKind, WaitingFor } from "@/lib/core/words";
import { id, reference, text, longText, time } from "./columns";

export class Case extends Model<InferAttributes<Case>, InferCreationAttributes<Case>> {
  declare id: string;
  declare ref: string;
  declare customerId: string;
  declare damage: string;
  declare note: CreationOptional<string | null>;
  declare dueOn: CreationOptional<string | null>;
  /** null while a request waits for its parcel */
  declare receivedAt: Date | null;
  /** null for a request that came through the public form */
  declare createdBy: string | null;
  declare requestedAt: CreationOptional<Date | null>;
  declare waitingFor: CreationOptional<WaitingFor | null>;
  declare waitingSince: CreationOptional<Date | null>;
  /** why it is on hold; null when it is not */
  declare holdReason: CreationOptional<string | null>;
  declare returnedAt: CreationOptional<Date | null>;
  declare closedKind: CreationOptional<ClosedKind | null>;
  /** the day from which its images are due for erasure */
  declare eraseOn: CreationOptional<string | null>;
  /** kept longer than that: until this day, or until a lead ends it */
  declare keptUntil: CreationOptional<string | null>;
  declare keptReason: CreationOptional<string | null>;
  /** the newest erasure of its images since it was closed */
  declare erasedAt: CreationOptional<Date | null>;
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
    receivedAt: time(true),
    createdBy: reference(true),
    requestedAt: time(true),
    waitingFor: text(12, true),
    waitingSince: time(true),
    holdReason: longText(true),
    returnedAt: time(true),
    closedKind: text(20, true),
    eraseOn: { type: DataTypes.DATEONLY, allowNull: true },
    keptUntil: { type: DataTypes.DATEONLY, allowNull: true },
    keptReason: longText(true),
    erasedAt: time(true),
    closedAt: time(true),
    closedReason: longText(true),
  }, { sequelize, modelName: "Case", tableName: "cases" });
}
