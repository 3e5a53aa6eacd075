import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { text, time, bytes } from "./columns";

export class SignInAttempt extends Model<InferAttributes<SignInAttempt>, InferCreationAttributes<SignInAttempt>> {
  declare id: CreationOptional<number>;
  declare account: Buffer;
  declare address: string;
  declare at: Date;
}

export function initSignInAttempt(sequelize: Sequelize): void {
  SignInAttempt.init({
    id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
    account: bytes(32),
    address: text(64),
    at: time(),
  }, { sequelize, modelName: "SignInAttempt", tableName: "sign_in_attempts" });
}
