import type { FormElementProps } from "./form-element";

/** A real form: Enter in any field sends it. Checks are ours, so the browser's own are off. */
export function FormElement({ label, onSubmit, children }: FormElementProps) {
  return (
    <form
      aria-label={label}
      noValidate
      style={{ display: "flex", flexDirection: "column", minWidth: 0 }}
      onSubmit={(event) => {
        event.preventDefault();
        onSubmit();
      }}
    >
      {children}
      {/* Without a submit button of its own a browser ignores Enter in a form of several fields. */}
      <button type="submit" tabIndex={-1} aria-hidden="true" style={{ display: "none" }} />
    </form>
  );
}
