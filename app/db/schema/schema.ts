/** All tables, for the client and for the generator of migrations. */
export * from "./auth";
export * from "./models";
export * from "./operations";
