/** All tables, for the client. */
import * as authTables from "./auth";
import * as modelTables from "./models";
import * as operationTables from "./operations";

export const schema = { ...authTables, ...modelTables, ...operationTables };
