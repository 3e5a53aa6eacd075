import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, time } from "./columns";

export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string;
  declare userId: string;
  declare createdAt: Date;
  declare lastSeenAt: Date;
  declare endedAt: CreationOptional<Date | null>;
}

export function initSession(sequelize: Sequelize): void {
  Session.init({
    id: id(),
    userId: reference(),
    createdAt: time(),
    lastSeenAt: time(),
    endedAt: time(true),
  }, { sequelize, modelName: "Session", tableName: "sessions" });
}
