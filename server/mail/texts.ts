import type { Mail } from "./mailer.ts";

type Words = Omit<Mail, "to">;

const FOOT = "Tangency sent this. It asks for nothing but what is written here, and never for a passphrase.";

const letter = (subject: string, ...paragraphs: readonly string[]): Words => ({
  subject,
  text: `${[...paragraphs, FOOT].join("\n\n")}\n`,
});

interface Invited {
  readonly inviter: string;
  readonly study: string;
  readonly role: string;
  readonly link: string;
  readonly until: string;
}

/** To someone who may have no account yet: whether they have one is asked when they come. */
export const invitation = ({ inviter, study, role, link, until }: Invited): Words =>
  letter(
    `${inviter} invites you to “${study}”`,
    `${inviter} invites you to the study “${study}”, as ${role === "owner" ? "an owner" : `a ${role}`}.`,
    `Accept or refuse here:\n${link}`,
    `The link is for you alone and opens until ${until}. Without an account you make one on the way.`,
  );

/** To an address from which an account was asked for, and which has none. */
export const newAccount = ({ link }: { readonly link: string }): Words =>
  letter(
    "Finish your account",
    "Someone, most likely you, wants an account of Tangency with this address.",
    `Choose a name and a passphrase here, and it is made:\n${link}`,
    "The link opens for one day. If it was not you, do nothing: there is no account.",
  );

/** To an address from which an account was asked for, and which has one. */
export const accountAlready = ({ signIn, forgotten }: { readonly signIn: string; readonly forgotten: string }): Words =>
  letter(
    "You have an account already",
    "Someone, most likely you, wants an account of Tangency with this address. It has one.",
    `Sign in:\n${signIn}`,
    `If the passphrase is forgotten, a new one is set here:\n${forgotten}`,
    "If it was not you, do nothing: nothing has changed.",
  );

export const passphraseReset = ({ name, link }: { readonly name: string; readonly link: string }): Words =>
  letter(
    "Set a new passphrase",
    `${name}, someone, most likely you, has forgotten the passphrase of this address.`,
    `Set a new one here:\n${link}`,
    "The link opens once, within an hour. Every session that is open then ends. If it was not you, do nothing: the passphrase stays as it is.",
  );

export const passphraseChanged = ({ name, forgotten }: { readonly name: string; readonly forgotten: string }): Words =>
  letter(
    "Your passphrase has been changed",
    `${name}, the passphrase of this address has been changed, and every other session has ended.`,
    `If it was not you, set a new one at once:\n${forgotten}`,
  );

/** To the address an account is to have. */
export const confirmAddress = ({ name, link }: { readonly name: string; readonly link: string }): Words =>
  letter(
    "Confirm your address",
    `${name}, this is to be the address of your account of Tangency.`,
    `Confirm it here:\n${link}`,
    "The link opens for one day. If it was not you, do nothing: nothing changes.",
  );

/** To an address that somebody wants for their account, and which another account has. */
export const addressTaken = (): Words =>
  letter(
    "Your address stays with your account",
    "Someone wants to give another account of Tangency this address. It is the address of yours, and stays with it.",
    "If you have two accounts, give this one another address first. If it was not you, do nothing.",
  );

/** To the address an account no longer has. */
export const addressChanged = ({ name, email }: { readonly name: string; readonly email: string }): Words =>
  letter(
    "The address of your account has changed",
    `${name}, your account of Tangency now has the address ${email}, and messages go there.`,
    "If it was not you, tell the administrator of the installation.",
  );

export const ownershipHandedOver = (about: { from: string; study: string; link: string }): Words =>
  letter(
    `“${about.study}” is yours`,
    `${about.from} has handed the study “${about.study}” over to you. You own it now; ${about.from} stays as a coauthor.`,
    `It is here:\n${about.link}`,
  );

/** To a referee. Where the authors are withheld, the letter does not name them either. */
export function refereeLink(about: {
  readonly study: string;
  readonly authors: readonly string[] | undefined;
  readonly link: string;
  readonly until: Date | undefined;
}): Words {
  const by = about.authors === undefined ? "" : ` by ${about.authors.join(", ")}`;
  const day = about.until?.toLocaleDateString("en-GB", { day: "numeric", month: "long", year: "numeric" });
  return letter(
    `A referee copy of “${about.study}”`,
    `You are sent a sealed copy of “${about.study}”${by}: its Slutsky matrix, the checks, the specification and the coefficients. Your own browser computes the matrix again and says how far it is from the sealed one.`,
    `It is read here, without an account:\n${about.link}`,
    `${day === undefined ? "The link opens until it is withdrawn." : `The link opens until ${day}.`} Whoever has it can read the copy; it holds no household's data.`,
  );
}
