import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, text, longText, time, whole, yes } from "./columns";

export class Mail extends Model<InferAttributes<Mail>, InferCreationAttributes<Mail>> {
  declare id: string;
  declare recipient: string;
  declare subject: string;
  declare textMasked: string;
  declare sealed: CreationOptional<Buffer | null>;
  /** which template made it */
  declare kind: CreationOptional<string>;
  declare state: "queued" | "sending" | "sent" | "dead";
  declare attempts: CreationOptional<number>;
  declare queuedAt: Date;
  declare nextAttemptAt: Date;
  declare leasedUntil: CreationOptional<Date | null>;
  declare sentAt: CreationOptional<Date | null>;
  declare possibleDuplicate: CreationOptional<boolean>;
  declare lastError: CreationOptional<string | null>;
}

export function initMail(sequelize: Sequelize): void {
  Mail.init({
    id: id(),
    recipient: text(254),
    subject: text(255),
    textMasked: longText(),
    sealed: { type: DataTypes.BLOB("medium"), allowNull: true },
    kind: { ...text(40), defaultValue: "other" },
    state: text(10),
    attempts: { ...whole(), defaultValue: 0 },
    queuedAt: time(),
    nextAttemptAt: time(),
    leasedUntil: time(true),
    sentAt: time(true),
    possibleDuplicate: yes(false),
    lastError: text(500, true),
  }, { sequelize, modelName: "Mail", tableName: "mails" });
}
