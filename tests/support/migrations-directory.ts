export const MIGRATIONS_DIRECTORY = "prisma/migrations";
