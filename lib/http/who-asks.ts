import { ROLES, type Role } from "#lib/contracts/api/operation.ts";

export interface Person {
  readonly name: string;
  readonly roles: readonly Role[];
}

/** Until there are accounts, whoever reaches this server is its keeper, and may do everything. */
export function whoAsks(): Person {
  return { name: "local keeper", roles: ROLES };
}
