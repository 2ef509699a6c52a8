import { defineConfig } from "prisma/config";

// The server applies migrations itself (lib/store/migrate.ts); this file serves `prisma generate`, and `prisma migrate`
// on a machine that has Prisma's native engine.
export default defineConfig({
  schema: "schema.prisma",
  migrations: { path: "migrations", seed: "tsx prisma/seed.ts --data .data/demo" },
  datasource: { url: process.env.DATABASE_URL ?? "file:../.data/demo/offing.sqlite" },
});
