import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import type { Role } from "@/lib/core/words";
import { id, text, time, yes } from "./columns";

export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: string;
  declare email: string;
  declare name: string;
  declare role: Role;
  declare passwordHash: string;
  declare mustChangePassword: CreationOptional<boolean>;
  declare disabledAt: CreationOptional<Date | null>;
  /** an auditor's account may carry an end */
  declare endsAt: CreationOptional<Date | null>;
  /** true: an auditor who sees the cases of `user_cases` and nothing else */
  declare limited: CreationOptional<boolean>;
  declare createdAt: Date;
}

export function initUser(sequelize: Sequelize): void {
  User.init({
    id: id(),
    email: text(254),
    name: text(120),
    role: text(20),
    passwordHash: text(255),
    mustChangePassword: yes(false),
    disabledAt: time(true),
    endsAt: time(true),
    limited: yes(false),
    createdAt: time(),
  }, { sequelize, modelName: "User", tableName: "users" });
}
