import { defineConfig } from "drizzle-kit";

export default defineConfig({ dialect: "sqlite", schema: "./app/db/schema/schema.ts", out: "./drizzle" });
