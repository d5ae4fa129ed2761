/** A message in plain words; the address it goes to is one person's. */
export interface Mail {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
}

/** What carries messages away from here. */
export interface Mailer {
  /** "post box" where messages stay in this installation and its administrators read them. */
  readonly kind: "mail server" | "post box";
  /** Done when the message has been taken; throws `MailFault` when it has not. */
  deliver(mail: Mail): Promise<void>;
}

/** Why a message was not taken, as far as an administrator needs to know. */
export class MailFault extends Error {
  override name = "MailFault";
  /** Trying again would be refused again, for instance because nobody has the address. */
  readonly forGood: boolean;

  constructor(sentence: string, forGood: boolean) {
    super(sentence);
    this.forGood = forGood;
  }
}
