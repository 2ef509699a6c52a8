import { apiDocument } from "#lib/contracts/api/api-document.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";

const DOCUMENT = apiDocument(Object.values(OPERATIONS));

export const GET = route(OPERATIONS.describeInterface, () => Promise.resolve({ body: DOCUMENT }));
