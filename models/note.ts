import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, longText, reference, time } from "./columns";

/** What somebody wrote about a case or a drive; a correction is a note of its own. */
export class Note extends Model<InferAttributes<Note>, InferCreationAttributes<Note>> {
  declare id: string;
  declare caseId: string;
  declare driveId: CreationOptional<string | null>;
  declare text: string;
  declare happenedAt: CreationOptional<Date | null>;
  declare correctsId: CreationOptional<string | null>;
  declare byUserId: string;
  declare at: Date;
}

export function initNote(sequelize: Sequelize): void {
  Note.init({
    id: id(),
    caseId: reference(),
    driveId: reference(true),
    text: longText(),
    happenedAt: time(true),
    correctsId: reference(true),
    byUserId: reference(),
    at: time(),
  }, { sequelize, modelName: "Note", tableName: "notes" });
}
