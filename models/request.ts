import { type CreationOptional, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from "sequelize";
import { bytes, id, longText, reference, time } from "./columns";

/** What a customer filled in on the public form; `answers` is canonical JSON of what they typed. */
export class Request extends Model<InferAttributes<Request>, InferCreationAttributes<Request>> {
  declare id: string;
  declare caseId: string;
  declare tokenHash: Buffer;
  declare answers: string;
  declare addressDigest: Buffer;
  declare requestedAt: Date;
  declare expiresAt: Date;
  declare deletionAskedAt: CreationOptional<Date | null>;
  declare deletionMessage: CreationOptional<string | null>;
  declare deletionAnsweredAt: CreationOptional<Date | null>;
  /** why not yet; null where the images were erased */
  declare deletionAnswer: CreationOptional<string | null>;
  declare deletionAnsweredBy: CreationOptional<string | null>;
}

export function initRequest(sequelize: Sequelize): void {
  Request.init({
    id: id(),
    caseId: reference(),
    tokenHash: bytes(32),
    answers: longText(),
    addressDigest: bytes(32),
    requestedAt: time(),
    expiresAt: time(),
    deletionAskedAt: time(true),
    deletionMessage: longText(true),
    deletionAnsweredAt: time(true),
    deletionAnswer: longText(true),
    deletionAnsweredBy: reference(true),
  }, { sequelize, modelName: "Request", tableName: "requests" });
}
