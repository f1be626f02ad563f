import type { Sequelize } from "sequelize";
import { AccessToken } from "./access-token";
import { Account } from "./account";
import { AuditEvent } from "./audit-event";
import { BathCheck } from "./bath-check";
import { BoreVersion } from "./bore-version";
import { Building } from "./building";
import { Certificate } from "./certificate";
import { Correction } from "./correction";
import { EnergyFill } from "./energy-fill";
import { ImportBatch } from "./import-batch";
import { ImportBatchFile } from "./import-batch-file";
import { Installation } from "./installation";
import { Instrument } from "./instrument";
import { Invitation } from "./invitation";
import { Loop } from "./loop";
import { LoopPump } from "./loop-pump";
import { Job } from "./job";
import { LogFile } from "./log-file";
import { LogImport } from "./log-import";
import { MeterComparison } from "./meter-comparison";
import { Membership } from "./membership";
import { MeteringPoint } from "./metering-point";
import { Organisation } from "./organisation";
import { OutboxMail } from "./outbox-mail";
import { PasswordReset } from "./password-reset";
import { Recipe } from "./recipe";
import { Session } from "./session";
import { SignInFailure } from "./sign-in-failure";
import { Site } from "./site";

/** A model file: one class with a static `define`, and `associate` where it refers to another. */
interface ModelDefinition {
  define(sequelize: Sequelize): void;
  associate?(): void;
}

/** To add a model: write its file beside this one and append the class here. */
const models: readonly ModelDefinition[] = [
  Organisation,
  Account,
  Membership,
  Session,
  AccessToken,
  Invitation,
  PasswordReset,
  SignInFailure,
  OutboxMail,
  AuditEvent,
  Site,
  Building,
  Loop,
  LoopPump,
  MeteringPoint,
  BoreVersion,
  Instrument,
  Certificate,
  BathCheck,
  Installation,
  LogImport,
  LogFile,
  Recipe,
  ImportBatch,
  ImportBatchFile,
  Correction,
  EnergyFill,
  MeterComparison,
  Job,
];

/** Binds every model to the connection, then their associations: all must exist by then. */
export function defineModels(sequelize: Sequelize): void {
  // Sequelize writes each column's name into its definition, so a definition that two columns share
  // would give both the first one's name: every column gets its own copy.
  sequelize.addHook("beforeDefine", (attributes) => {
    for (const [name, column] of Object.entries(attributes))
      Reflect.set(attributes, name, { ...(column as object) });
  });
  for (const model of models) model.define(sequelize);
  for (const model of models) model.associate?.();
}
