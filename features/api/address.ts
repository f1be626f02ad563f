import type { Contract } from "@shared/contracts/contract";

/** The address of a call, its parameters in place; also what a download link points at. */
export function addressOf(
  contract: Pick<Contract, "path">,
  input: { readonly params?: unknown; readonly query?: unknown },
): string {
  const params = (input.params ?? {}) as Record<string, unknown>;
  const path = contract.path.replace(/:(\w+)/g, (_, name: string) => {
    const value = params[name];
    if (value === undefined) throw new RangeError(`${contract.path} needs ${name}`);
    return encodeURIComponent(String(value));
  });
  const query = new URLSearchParams();
  for (const [name, value] of Object.entries((input.query ?? {}) as Record<string, unknown>)) {
    if (value !== undefined && value !== null) query.set(name, String(value));
  }
  const text = query.toString();
  return `/api/v1${path}${text ? `?${text}` : ""}`;
}
