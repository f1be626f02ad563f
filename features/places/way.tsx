import { Button, TextLink } from "@features/ui";

/** A way on from a row: words in a table, a button that a thumb can hit on a card. */
export function Way(props: { phone: boolean; label: string; said: string; href: string }) {
  const { phone, label, said, href } = props;
  return phone ? (
    <Button kind="second" label={label} said={said} href={href} />
  ) : (
    <TextLink variant="table" label={label} said={said} href={href} />
  );
}
