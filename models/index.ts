import "server-only";
import { connection } from "./connection";
import { User, initUser } from "./user";
import { Session, initSession } from "./session";
import { SignInAttempt, initSignInAttempt } from "./sign-in-attempt";
import { BenchToken, initBenchToken } from "./bench-token";
import { PolicyRow, initPolicyRow } from "./policy";
import { Customer, initCustomer } from "./customer";
import { Case, initCase } from "./case";
import { Drive, initDrive } from "./drive";
import { Board, initBoard } from "./board";
import { Chip, initChip } from "./chip";
import { Image, initImage } from "./image";
import { ComparisonRow, initComparisonRow } from "./comparison";
import { Read, initRead } from "./read";
import { ApprovalRequest, initApprovalRequest } from "./approval-request";
import { Approval, initApproval } from "./approval";
import { Transfer, initTransfer } from "./transfer";
import { CustodyHead, initCustodyHead } from "./custody-head";
import { CustodyEntry, initCustodyEntry } from "./custody-entry";
import { Seal, initSeal } from "./seal";
import { ChainCheck, initChainCheck } from "./chain-check";
import { HandOver, initHandOver } from "./hand-over";
import { UserCase, initUserCase } from "./user-case";
import { Request, initRequest } from "./request";
import { Receipt, initReceipt } from "./receipt";
import { ShelfBoard, initShelfBoard } from "./shelf-board";
import { Photo, initPhoto } from "./photo";
import { Note, initNote } from "./note";
import { StartUpTest, initStartUpTest } from "./start-up-test";
import { CaseReturn, initCaseReturn } from "./case-return";
import { Erasure, initErasure } from "./erasure";
import { Mail, initMail } from "./mail";
import { Share, initShare } from "./share";
import { IdempotencyKey, initIdempotencyKey } from "./idempotency-key";

// The models carry names of their own: the build shortens class names, and two short ones would collide.
const sequelize = connection();
for (const init of [
  initUser,
  initSession,
  initSignInAttempt,
  initBenchToken,
  initPolicyRow,
  initCustomer,
  initCase,
  initDrive,
  initBoard,
  initChip,
  initImage,
  initComparisonRow,
  initRead,
  initApprovalRequest,
  initApproval,
  initTransfer,
  initCustodyHead,
  initCustodyEntry,
  initSeal,
  initChainCheck,
  initHandOver,
  initUserCase,
  initRequest,
  initReceipt,
  initShelfBoard,
  initPhoto,
  initNote,
  initStartUpTest,
  initCaseReturn,
  initErasure,
  initMail,
  initShare,
  initIdempotencyKey,
]) init(sequelize);

Session.belongsTo(User, { foreignKey: "userId", as: "user" });
BenchToken.belongsTo(User, { foreignKey: "userId", as: "user" });
Case.belongsTo(Customer, { foreignKey: "customerId", as: "customer" });
Case.hasMany(Drive, { foreignKey: "caseId", as: "drives" });
Drive.belongsTo(Case, { foreignKey: "caseId", as: "case" });
Drive.hasMany(Board, { foreignKey: "driveId", as: "boards" });
Board.belongsTo(Drive, { foreignKey: "driveId", as: "drive" });
Board.hasMany(Chip, { foreignKey: "boardId", as: "chips" });
Chip.belongsTo(Board, { foreignKey: "boardId", as: "board" });
Chip.hasMany(Read, { foreignKey: "chipId", as: "reads" });
Read.belongsTo(Chip, { foreignKey: "chipId", as: "chip" });
Read.belongsTo(Image, { foreignKey: "sha256", as: "image" });

export { connection, inTransaction, isDatabaseAway, type Transaction, withReceipt } from "./connection";
export {
  User,
  Session,
  SignInAttempt,
  BenchToken,
  PolicyRow,
  Customer,
  Case,
  Drive,
  Board,
  Chip,
  Image,
  ComparisonRow,
  Read,
  ApprovalRequest,
  Approval,
  Transfer,
  CustodyHead,
  CustodyEntry,
  Seal,
  ChainCheck,
  HandOver,
  UserCase,
  Request,
  Receipt,
  ShelfBoard,
  Photo,
  Note,
  StartUpTest,
  CaseReturn,
  Erasure,
  Mail,
  Share,
  IdempotencyKey,
};
