import { useMutation } from "@tanstack/react-query";

import { useFieldWords } from "@features/i18n";

import { ApiError } from "./api-error";
import { useErrorWords } from "./use-error-words";

/** A change being sent: whether it is under way, and what the server said against it. */
export interface Change<Input, Answer> {
  readonly send: (input: Input, onDone?: (answer: Answer) => void) => void;
  readonly busy: boolean;
  readonly done: boolean;
  readonly error: Error | null;
  /** The refusal in words for the top of a form; empty when the fields say it all. */
  readonly formErrors: readonly string[];
  /** The refusal of one field of the body. */
  readonly fieldError: (name: string) => string | null;
  readonly reset: () => void;
}

/**
 * Sends a change. Without a network it fails at once and says so, instead of
 * being sent unseen when the network comes back.
 *
 * @param fields fields of the body the form can show an error at
 */
export function useChange<Input, Answer>(given: {
  readonly send: (input: Input) => Promise<Answer>;
  readonly onDone?: (answer: Answer, input: Input) => unknown;
  readonly fields?: readonly string[];
}): Change<Input, Answer> {
  const inWords = useErrorWords();
  const fieldWords = useFieldWords();
  const mutation = useMutation({
    mutationFn: given.send,
    onSuccess: given.onDone,
    networkMode: "always",
  });
  const { error } = mutation;
  const refused = error instanceof ApiError ? (error.problem.errors ?? []) : [];
  const known = (given.fields ?? []).map((name) => `/body/${name}`);
  const elsewhere = refused.filter(({ pointer }) => !known.includes(pointer));
  const formErrors =
    error === null
      ? []
      : refused.length === 0
        ? [inWords(error)]
        : elsewhere.map((entry) => fieldWords(entry));
  return {
    send: (input, onDone) => {
      if (!mutation.isPending) mutation.mutate(input, { onSuccess: onDone });
    },
    busy: mutation.isPending,
    done: mutation.isSuccess,
    error,
    formErrors,
    fieldError: (name) => {
      const entry = refused.find(({ pointer }) => pointer === `/body/${name}`);
      return entry ? fieldWords(entry) : null;
    },
    reset: mutation.reset,
  };
}
