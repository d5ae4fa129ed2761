/** Whose installation it is; one that has not been given a name is not made up into somebody's. */
export function installationInWords(name: string): string {
  return name === "Tangency" ? "On this installation." : `The installation of ${name.replace(/\.$/, "")}.`;
}
