import { REGISTER_COLUMNS, type RegisterOrder } from "#lib/presentation/register-rows.ts";

/** What the reader of the register has chosen to see; it stands in the address. */
export interface RegisterView {
  readonly filter: string;
  readonly chosen: string | null;
  readonly order: RegisterOrder;
  readonly isBringingIn: boolean;
}

export function viewFromQuery(query: URLSearchParams): RegisterView {
  const sort = query.get("sort") ?? "";
  const column = REGISTER_COLUMNS.find((one) => one === sort.replace(/^-/, "")) ?? "id";
  return {
    filter: query.get("filter") ?? "",
    chosen: query.get("station"),
    order: { column, isDescending: sort === `-${column}` },
    isBringingIn: query.get("file") === "yes",
  };
}

/** The same view as a query, empty for the default one. */
export function queryFromView({ filter, chosen, order, isBringingIn }: RegisterView): string {
  const query = new URLSearchParams();
  if (filter !== "") query.set("filter", filter);
  if (chosen !== null) query.set("station", chosen);
  if (order.column !== "id" || order.isDescending) query.set("sort", `${order.isDescending ? "-" : ""}${order.column}`);
  if (isBringingIn) query.set("file", "yes");
  const text = query.toString();
  return text === "" ? "" : `?${text}`;
}
