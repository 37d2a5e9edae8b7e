import { getTableColumns } from "drizzle-orm";
import type { SQLiteTable } from "drizzle-orm/sqlite-core";
import { getAuthTables } from "better-auth/db";
import { organization } from "better-auth/plugins/organization";
import { expect, test } from "vitest";
import { schema } from "~/db/schema/schema";

// Source: better-auth's own description of the tables that it and its organization plugin expect.
const expected = getAuthTables({ plugins: [organization()] });
const storage: Readonly<Record<string, string>> = { string: "string", boolean: "boolean", date: "date", number: "number" };

test.each(Object.keys(expected))("the table %s has every column that better-auth expects, of its type", (name) => {
  const table = (schema as unknown as Record<string, SQLiteTable | undefined>)[name];
  if (!table) throw new Error(`No table ${name}`);
  const columns = getTableColumns(table);
  for (const [field, about] of Object.entries(expected[name]?.fields ?? {})) {
    const column = columns[about.fieldName ?? field];
    expect(`${name}.${field}: ${column?.dataType}`).toBe(`${name}.${field}: ${storage[String(about.type)]}`);
    if (about.unique) expect(`${field} unique ${column?.isUnique}`).toBe(`${field} unique true`);
    if (!about.required) expect(`${field} notNull ${column?.notNull}`).toBe(`${field} notNull false`);
  }
  const known = new Set(["id", ...Object.entries(expected[name]?.fields ?? {}).map(([f, about]) => about.fieldName ?? f)]);
  expect(Object.keys(columns).filter((column) => !known.has(column))).toEqual([]);
});
