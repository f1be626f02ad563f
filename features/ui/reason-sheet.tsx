import { useState } from "react";
import { Button } from "./button";
import { Form } from "./form";
import { Sheet } from "./sheet";
import { Text } from "./text";
import { TextField } from "./text-field";

/** Asks why something is taken out of use before it is; the reason is what stays with it. */
export function ReasonSheet(props: {
  readonly title: string;
  readonly lead: string;
  readonly label: string;
  /** Said at the field where it was sent empty. */
  readonly needed: string;
  readonly send: string;
  readonly busy: boolean;
  readonly errors: readonly string[];
  readonly error: string | null;
  /** With the reason, trimmed and not empty. */
  readonly onSend: (reason: string) => void;
  readonly onClose: () => void;
}) {
  const { title } = props;
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
  const given = reason.trim();
  const submit = () => {
    setTried(true);
    if (given !== "") props.onSend(given);
  };
  return (
    <Sheet open kind="side" title={title} onClose={props.onClose}>
      <Form label={title} onSubmit={submit} errors={props.errors}>
        <Text tone="ink2">{props.lead}</Text>
        <TextField
          label={props.label}
          value={reason}
          onChange={setReason}
          error={tried && given === "" ? props.needed : props.error}
          required
          autoComplete="off"
        />
        <Button submit full label={props.send} busy={props.busy} />
      </Form>
    </Sheet>
  );
}
