const part = encodeURIComponent;

/** Addresses of pages. */
export const pages = {
  studies: "/",
  signIn: "/sign-in",
  createAccount: "/create-account",
  forgottenPassphrase: "/forgotten-passphrase",
  account: "/account",
  administration: "/administration",
  study: (studyId: string) => `/studies/${part(studyId)}`,
  cell: (studyId: string, cellId: string) => `/studies/${part(studyId)}/cells/${part(cellId)}`,
  history: (studyId: string) => `/studies/${part(studyId)}/history`,
  compare: (studyId: string, leftId: string, rightId: string) =>
    `/studies/${part(studyId)}/compare/${part(leftId)}/${part(rightId)}`,
  referee: (token: string) => `/referee/${part(token)}`,
} as const;

const study = (studyId: string) => `/api/studies/${part(studyId)}`;

/** Addresses of the API. */
export const api = {
  installation: "/api/installation",
  me: "/api/me",
  signIn: "/api/auth/sign-in/email",
  signOut: "/api/auth/sign-out",
  askReset: "/api/auth/request-password-reset",
  reset: "/api/auth/reset-password",
  changePassphrase: "/api/auth/change-password",
  accountLinks: "/api/account-links",
  accountLink: (token: string) => `/api/account-links/${part(token)}`,
  addressLink: (token: string) => `/api/address-links/${part(token)}`,
  account: "/api/account",
  accountAddress: "/api/account/address",
  sessions: "/api/account/sessions",
  session: (sessionId: string) => `/api/account/sessions/${part(sessionId)}`,
  ownInvitations: "/api/account/invitations",
  ownInvitation: (invitationId: string) => `/api/account/invitations/${part(invitationId)}`,
  linkedInvitation: (token: string) => `/api/invitations/${part(token)}`,
  linkedInvitationAccount: (token: string) => `/api/invitations/${part(token)}/account`,
  deletedStudies: "/api/deleted-studies",
  deletedStudy: (studyId: string) => `/api/deleted-studies/${part(studyId)}`,
  mails: "/api/administration/mails",
  mail: (mailId: string) => `/api/administration/mails/${part(mailId)}`,
  accounts: "/api/administration/accounts",
  installationJournal: (before?: number) => `/api/administration/journal${before ? `?before=${before}` : ""}`,
  studies: "/api/studies",
  study,
  people: (studyId: string) => `${study(studyId)}/people`,
  person: (studyId: string, userId: string) => `${study(studyId)}/people/${part(userId)}`,
  owner: (studyId: string) => `${study(studyId)}/owner`,
  invitations: (studyId: string) => `${study(studyId)}/invitations`,
  invitation: (studyId: string, invitationId: string) => `${study(studyId)}/invitations/${part(invitationId)}`,
  journal: (studyId: string, before?: number) => `${study(studyId)}/journal${before ? `?before=${before}` : ""}`,
  putAway: (studyId: string) => `${study(studyId)}/put-away`,
  uploads: (studyId: string) => `${study(studyId)}/uploads`,
  upload: (studyId: string, uploadId: string) => `${study(studyId)}/uploads/${part(uploadId)}`,
  estimation: (studyId: string, cellId: string) => `${study(studyId)}/cells/${part(cellId)}/estimation`,
  estimations: (studyId: string) => `${study(studyId)}/estimations`,
  finding: (studyId: string, fingerprint: string) => `${study(studyId)}/findings/${part(fingerprint)}`,
  remarks: (studyId: string) => `${study(studyId)}/remarks`,
  remark: (studyId: string, remarkId: string) => `${study(studyId)}/remarks/${part(remarkId)}`,
  remarkSettled: (studyId: string, remarkId: string) => `${study(studyId)}/remarks/${part(remarkId)}/settled`,
  replies: (studyId: string, remarkId: string) => `${study(studyId)}/remarks/${part(remarkId)}/replies`,
  reply: (studyId: string, remarkId: string, replyId: string) =>
    `${study(studyId)}/remarks/${part(remarkId)}/replies/${part(replyId)}`,
  history: (studyId: string) => `${study(studyId)}/history`,
  latestEdits: (studyId: string) => `${study(studyId)}/history/latest`,
  checkpoints: (studyId: string) => `${study(studyId)}/checkpoints`,
  checkpoint: (studyId: string, checkpointId: string) => `${study(studyId)}/checkpoints/${part(checkpointId)}`,
  checkpointFile: (studyId: string, checkpointId: string) =>
    `${study(studyId)}/checkpoints/${part(checkpointId)}/study.yaml`,
  checkpointReturn: (studyId: string, checkpointId: string) =>
    `${study(studyId)}/checkpoints/${part(checkpointId)}/return`,
  refereeCopies: (studyId: string) => `${study(studyId)}/referee-copies`,
  refereeLink: (studyId: string, copyId: string) => `${study(studyId)}/referee-copies/${part(copyId)}/link`,
  refereeCopy: (studyId: string, copyId: string) => `${study(studyId)}/referee-copies/${part(copyId)}`,
} as const;
