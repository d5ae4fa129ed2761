/** People of the invented study, and the one passphrase of all three: public wherever demo mode is on. */
export const DEMO_PASSPHRASE = "the levy on sweet drinks";

export const DEMO_PEOPLE = [
  { name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example", role: "owner" },
  { name: "Tomás Adeyemi", email: "tomas.adeyemi@vihe.example", role: "coauthor" },
  { name: "Petra Vance", email: "petra.vance@vihe.example", role: "reader" },
] as const;
