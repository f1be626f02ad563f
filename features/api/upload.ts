import type { Contract } from "@shared/contracts/contract";
import type { z } from "zod";
import { addressOf } from "./address";
import { ApiError, NoAnswer, problemFrom } from "./api-error";
import { GUARD_HEADERS } from "./call";

/**
 * Sends one file as multipart field `file`, telling how much of it has left.
 * XMLHttpRequest, because fetch does not tell how far an upload is.
 */
export function upload<C extends Contract>(
  contract: C,
  given: {
    readonly params: z.input<C["params"]>;
    readonly file: File;
    readonly onProgress: (share: number) => void;
    readonly signal?: AbortSignal;
  },
): Promise<z.output<C["answer"]>> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open(contract.method.toUpperCase(), addressOf(contract, given));
    for (const [name, value] of Object.entries(GUARD_HEADERS)) {
      request.setRequestHeader(name, value);
    }
    request.upload.onprogress = (event) => {
      if (event.lengthComputable) given.onProgress(event.loaded / event.total);
    };
    request.onerror = () => reject(new NoAnswer(new Error("the upload broke off")));
    request.onabort = () => reject(new DOMException("the upload was stopped", "AbortError"));
    request.onload = () => {
      if (request.status < 200 || request.status > 299) {
        reject(new ApiError(problemFrom(request.status, request.responseText)));
        return;
      }
      try {
        resolve(contract.answer.parse(JSON.parse(request.responseText)) as z.output<C["answer"]>);
      } catch (cause) {
        reject(cause);
      }
    };
    given.signal?.addEventListener("abort", () => request.abort(), { once: true });
    const form = new FormData();
    form.append("file", given.file, given.file.name);
    request.send(form);
  });
}
