/** What a Prisma schema says of a column, in the database's words. */
export interface SchemaColumn {
  readonly name: string;
  readonly type: "TEXT" | "INTEGER" | "REAL";
  readonly required: boolean;
}

export interface SchemaTable {
  readonly name: string;
  readonly columns: readonly SchemaColumn[];
  /** Columns of the primary key and of each unique rule, joined with commas, sorted. */
  readonly primaryKey: string;
  readonly unique: readonly string[];
  /** `column,column -> table(column,column) action of delete`, sorted. */
  readonly foreignKeys: readonly string[];
}

const SCALARS: Readonly<Record<string, SchemaColumn["type"] | undefined>> = { String: "TEXT", Int: "INTEGER", Float: "REAL" };
const FIELD = /^(?<name>\w+)\s+(?<type>\w+)(?<mark>\?|\[\])?(?<rest>.*)$/;

interface Field {
  readonly name: string;
  readonly type: string;
  readonly mark: string;
  readonly rest: string;
}

/** Reads as much of the Prisma schema language as `prisma/schema.prisma` uses. */
export function readPrismaSchema(text: string): SchemaTable[] {
  const models = [...text.matchAll(/^model (\w+) \{\n(.*?)^\}/gms)].map((match) => {
    const lines = (match[2] ?? "").split("\n").map((line) => line.trim()).filter((line) => line !== "" && !line.startsWith("//"));
    const fields = lines.flatMap((line) => readField(line));
    const rules = lines.filter((line) => line.startsWith("@@"));
    const table = rules.map((rule) => /^@@map\("(\w+)"\)/.exec(rule)?.[1]).find((name) => name !== undefined);
    return { name: match[1] ?? "", table: table ?? match[1] ?? "", fields, rules };
  });
  return models.map((model) => {
    const columnOf = (field: string) => columnName(model.fields.find((other) => other.name === field));
    const rule = (kind: string) => model.rules.filter((line) => line.startsWith(`@@${kind}(`)).map((line) => listed(line).map(columnOf).join(","));
    const marked = (mark: string) => model.fields.filter((field) => new RegExp(`${mark}\\b`).test(field.rest)).map(columnName);
    return {
      name: model.table,
      columns: model.fields.flatMap(readColumn),
      primaryKey: [...marked("@id"), ...rule("id")].join(),
      unique: [...marked("@unique"), ...rule("unique")].sort(),
      foreignKeys: model.fields
        .filter((field) => /@relation\(.*fields: /.test(field.rest))
        .map((field) => {
          const other = models.find((candidate) => candidate.name === field.type);
          const target = (name: string) => columnName(other?.fields.find((candidate) => candidate.name === name));
          const action = /onDelete: (\w+)/.exec(field.rest)?.[1]?.toUpperCase() ?? "";
          const from = listed(field.rest, "fields: ").map(columnOf).join();
          return `${from} -> ${other?.table ?? ""}(${listed(field.rest, "references: ").map(target).join()}) ${action}`;
        })
        .sort(),
    };
  });
}

function readField(line: string): Field[] {
  const groups = FIELD.exec(line)?.groups;
  if (line.startsWith("@@") || groups === undefined) return [];
  return [{ name: groups.name ?? "", type: groups.type ?? "", mark: groups.mark ?? "", rest: groups.rest ?? "" }];
}

function readColumn(field: Field): SchemaColumn[] {
  const type = SCALARS[field.type];
  return type === undefined ? [] : [{ name: columnName(field), type, required: field.mark !== "?" }];
}

function columnName(field: Field | undefined): string {
  return /@map\("(\w+)"\)/.exec(field?.rest ?? "")?.[1] ?? field?.name ?? "";
}

function listed(text: string, before = ""): string[] {
  const inside = new RegExp(`${before}\\[([^\\]]*)\\]`).exec(text)?.[1] ?? "";
  return inside.split(",").map((name) => name.trim());
}
