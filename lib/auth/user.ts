/** The person behind a request, as every use case receives them. */
export type SessionUser = {
  id: string;
  name: string;
  email: string;
  isAdmin: boolean;
  /** the row of `sessions`, not the secret in the cookie */
  sessionId: string;
};
