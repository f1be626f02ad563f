export { addressOf } from "./address";
export { Answer, FailedAnswer } from "./answer";
export { ApiError, NoAnswer } from "./api-error";
export { call, type CallInput } from "./call";
export { createQueryClient } from "./query-client";
export { sessionQuery, useSession } from "./session-queries";
export { upload } from "./upload";
export { useOfflineSince } from "./use-offline";
export { useErrorWords } from "./use-error-words";
