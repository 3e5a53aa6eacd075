import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, longText, reference, text, time, whole, yes } from "./columns";

/** The drive with its donor board, powered for the first time and after. */
export class StartUpTest extends Model<InferAttributes<StartUpTest>, InferCreationAttributes<StartUpTest>> {
  declare id: string;
  declare driveId: string;
  declare spins: boolean;
  declare ready: boolean;
  declare reportedSerial: CreationOptional<string | null>;
  declare serialMatches: CreationOptional<boolean | null>;
  declare attempts: number;
  declare note: CreationOptional<string | null>;
  declare byUserId: string;
  declare at: Date;
}

export function initStartUpTest(sequelize: Sequelize): void {
  StartUpTest.init({
    id: id(),
    driveId: reference(),
    spins: yes(false),
    ready: yes(false),
    reportedSerial: text(120, true),
    serialMatches: { type: DataTypes.BOOLEAN, allowNull: true },
    attempts: whole(),
    note: longText(true),
    byUserId: reference(),
    at: time(),
  }, { sequelize, modelName: "StartUpTest", tableName: "start_up_tests" });
}
