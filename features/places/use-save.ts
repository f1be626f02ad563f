import { useMutation, useQueryClient } from "@tanstack/react-query";
import { ApiError, NoAnswer } from "@features/api";
import { useWords } from "@features/i18n";

/** Field errors of a form by field name, such as `tag` or `pipe/wallMm`; form errors by sentence. */
export interface SaveErrors {
  readonly field: (name: string) => string | null;
  readonly form: readonly string[];
}

export interface Saving<Body, Answer> {
  readonly save: (body: Body, onSaved: (answer: Answer) => void) => void;
  readonly busy: boolean;
  /** Forgets what was refused: the form has changed since. */
  readonly reset: () => void;
  readonly errors: SaveErrors;
}

/**
 * Sends a change. What the server refuses comes back as words: at a field where it names one,
 * above the form otherwise. After a change every answer on screen is asked for again, because
 * energy, lists and abilities all hang on places.
 */
export function useSave<Body, Answer>(
  send: (body: Body) => Promise<Answer>,
  /** Names of the fields the form can show an error at. */
  fields: readonly string[],
): Saving<Body, Answer> {
  const t = useWords("places");
  const client = useQueryClient();
  const mutation = useMutation({
    mutationFn: send,
    onSuccess: () => client.invalidateQueries(),
  });
  const { error } = mutation;

  // The server's sentences are English; the codes it is known to send have words of our own.
  const wordsFor = (code: string, message: string) =>
    t(`refused.${code}`, { defaultValue: message });

  const problems =
    error instanceof ApiError
      ? (error.problem.errors ?? []).map(({ pointer, code, message }) => ({
          name: pointer.replace(/^\/body\//, ""),
          words: wordsFor(code, message),
        }))
      : [];
  const form: string[] = problems
    .filter(({ name }) => !fields.includes(name))
    .map(({ words }) => words);
  if (error instanceof ApiError && problems.length === 0)
    form.push(
      t(`refused.${error.code}`, {
        defaultValue: `${error.problem.detail} ${error.problem.remedy}`,
      }),
    );
  else if (error instanceof NoAnswer) form.push(t("save.noAnswer"));
  else if (error && !(error instanceof ApiError)) form.push(t("save.failed"));

  return {
    save: (body, onSaved) => mutation.mutate(body, { onSuccess: onSaved }),
    busy: mutation.isPending,
    reset: () => {
      if (mutation.isError) mutation.reset();
    },
    errors: {
      field: (name) => problems.find((problem) => problem.name === name)?.words ?? null,
      form,
    },
  };
}
