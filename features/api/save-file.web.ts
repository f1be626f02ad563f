/** Downloads a file of the API; the server names it. */
export function saveFile(address: string): void {
  const link = document.createElement("a");
  link.href = address;
  link.download = "";
  document.body.append(link);
  link.click();
  link.remove();
}
