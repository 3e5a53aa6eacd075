import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { id, longText, text, time } from "./columns";

export class Customer extends Model<InferAttributes<Customer>, InferCreationAttributes<Customer>> {
  declare id: string;
  declare name: string;
  declare email: string;
  declare phone: CreationOptional<string | null>;
  declare contact: CreationOptional<string | null>;
  declare company: CreationOptional<string | null>;
  declare returnAddress: CreationOptional<string | null>;
  declare createdAt: Date;
}

export function initCustomer(sequelize: Sequelize): void {
  Customer.init({
    id: id(),
    name: text(200),
    email: text(254),
    phone: text(60, true),
    contact: text(200, true),
    company: text(200, true),
    returnAddress: longText(true),
    createdAt: time(),
  }, { sequelize, modelName: "Customer", tableName: "customers" });
}
