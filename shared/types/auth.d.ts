declare module '#auth-utils' {
  interface User {
    id: string
    organisationId: string
  }
  interface SecureSessionData {
    /** Random id of the row in `sessions`; the cookie is worth nothing without it. */
    sessionId: string
  }
}

export {}
