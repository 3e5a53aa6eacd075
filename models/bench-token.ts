import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, reference, text, time, bytes } from "./columns";

export class BenchToken extends Model<InferAttributes<BenchToken>, InferCreationAttributes<BenchToken>> {
  declare id: string;
  declare userId: string;
  declare name: string;
  declare tokenHash: Buffer;
  declare createdAt: Date;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
}

export function initBenchToken(sequelize: Sequelize): void {
  BenchToken.init({
    id: id(),
    userId: reference(),
    name: text(120),
    tokenHash: bytes(32),
    createdAt: time(),
    lastUsedAt: time(true),
    withdrawnAt: time(true),
  }, { sequelize, modelName: "BenchToken", tableName: "bench_tokens" });
}
