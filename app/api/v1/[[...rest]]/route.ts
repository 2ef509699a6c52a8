import { nothingHere } from "#lib/http/answer-request.ts";

/** Every address of the programming interface that no operation has. */
export { nothingHere as GET, nothingHere as POST, nothingHere as PUT, nothingHere as PATCH, nothingHere as DELETE };
