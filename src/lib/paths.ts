const part = encodeURIComponent;

/** Addresses of pages. */
export const pages = {
  studies: "/",
  signIn: "/sign-in",
  createAccount: "/create-account",
  study: (studyId: string) => `/studies/${part(studyId)}`,
  cell: (studyId: string, cellId: string) => `/studies/${part(studyId)}/cells/${part(cellId)}`,
  referee: (token: string) => `/referee/${part(token)}`,
} as const;

const study = (studyId: string) => `/api/studies/${part(studyId)}`;

/** Addresses of the API. */
export const api = {
  installation: "/api/installation",
  me: "/api/me",
  signIn: "/api/auth/sign-in/email",
  signUp: "/api/auth/sign-up/email",
  signOut: "/api/auth/sign-out",
  studies: "/api/studies",
  study,
  people: (studyId: string) => `${study(studyId)}/people`,
  person: (studyId: string, userId: string) => `${study(studyId)}/people/${part(userId)}`,
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
  refereeCopies: (studyId: string) => `${study(studyId)}/referee-copies`,
  refereeCopy: (studyId: string, copyId: string) => `${study(studyId)}/referee-copies/${part(copyId)}`,
} as const;
