import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { ItemType } from "@/lib/core/words";
import { id, longText, reference, text, time } from "./columns";

/** An item went from person and place to person and place; open until the receiver confirms. */
export class HandOver extends Model<InferAttributes<HandOver>, InferCreationAttributes<HandOver>> {
  declare id: string;
  declare driveId: string;
  declare itemType: ItemType;
  declare itemId: string;
  declare fromPerson: string;
  declare fromPlace: string;
  declare toPerson: string;
  declare toPlace: string;
  /** the receiver, where they have an account */
  declare toUserId: string | null;
  declare itemCondition: string;
  declare sealNumber: string | null;
  declare note: string | null;
  declare givenBy: string;
  declare givenAt: Date;
  /** false: the receiver, or the giver, says that it did not arrive; null while it is open */
  declare received: CreationOptional<boolean | null>;
  declare confirmedBy: CreationOptional<string | null>;
  declare confirmedAt: CreationOptional<Date | null>;
  declare confirmation: CreationOptional<string | null>;
}

export function initHandOver(sequelize: Sequelize): void {
  HandOver.init({
    id: id(),
    driveId: reference(),
    itemType: text(10),
    itemId: reference(),
    fromPerson: text(120),
    fromPlace: text(200),
    toPerson: text(120),
    toPlace: text(200),
    toUserId: reference(true),
    itemCondition: longText(),
    sealNumber: text(80, true),
    note: longText(true),
    givenBy: reference(),
    givenAt: time(),
    received: { type: DataTypes.BOOLEAN, allowNull: true },
    confirmedBy: reference(true),
    confirmedAt: time(true),
    confirmation: text(500, true),
  }, { sequelize, modelName: "HandOver", tableName: "hand_overs" });
}
