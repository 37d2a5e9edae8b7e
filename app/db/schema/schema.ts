/** All tables, for the client. */
import * as authTables from "./auth";
import * as liveTables from "./live";
import * as modelTables from "./models";
import * as operationTables from "./operations";
import * as outboxTables from "./outbox";
import * as reviewTables from "./reviews";
import * as sourceTables from "./sources";

export const schema = { ...authTables, ...liveTables, ...modelTables, ...operationTables, ...outboxTables, ...reviewTables, ...sourceTables };
