import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { reference, text, longText, time, whole, bytes } from "./columns";

export class IdempotencyKey extends Model<InferAttributes<IdempotencyKey>, InferCreationAttributes<IdempotencyKey>> {
  declare userId: string;
  declare route: string;
  declare idempotencyKey: string;
  declare requestHash: Buffer;
  declare status: CreationOptional<number | null>;
  declare answer: CreationOptional<string | null>;
  declare createdAt: Date;
}

export function initIdempotencyKey(sequelize: Sequelize): void {
  IdempotencyKey.init({
    userId: { ...reference(), primaryKey: true },
    route: { ...text(200), primaryKey: true },
    idempotencyKey: { ...text(200), primaryKey: true },
    requestHash: bytes(32),
    status: whole(true),
    answer: longText(true),
    createdAt: time(),
  }, { sequelize, modelName: "IdempotencyKey", tableName: "idempotency_keys" });
}
