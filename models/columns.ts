import { DataTypes } from "sequelize";

/** Column types that every table uses. Functions, because Sequelize changes the objects it is given. */
export const id = () => ({ type: DataTypes.CHAR(36), primaryKey: true });
export const reference = (allowNull = false) => ({ type: DataTypes.CHAR(36), allowNull });
export const text = (length = 255, allowNull = false) => ({ type: DataTypes.STRING(length), allowNull });
export const longText = (allowNull = false) => ({ type: DataTypes.TEXT("medium"), allowNull });
export const time = (allowNull = false) => ({ type: DataTypes.DATE(6), allowNull });
export const whole = (allowNull = false) => ({ type: DataTypes.INTEGER.UNSIGNED, allowNull });
export const yes = (defaultValue: boolean) => ({ type: DataTypes.BOOLEAN, allowNull: false, defaultValue });
/** a digest or signature: Buffer in, Buffer out */
export const bytes = (length: number, allowNull = false) => ({ type: DataTypes.STRING(length, true), allowNull });
