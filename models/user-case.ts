import { type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id } from "./columns";

/** A case that a limited auditor may see. */
export class UserCase extends Model<InferAttributes<UserCase>, InferCreationAttributes<UserCase>> {
  declare userId: string;
  declare caseId: string;
}

export function initUserCase(sequelize: Sequelize): void {
  UserCase.init({ userId: id(), caseId: id() }, { sequelize, modelName: "UserCase", tableName: "user_cases" });
}
