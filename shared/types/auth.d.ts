declare module '#auth-utils' {
  interface SecureSessionData {
    /** Names the row of the session; pages never see it. */
    sessionId: string
  }
}

export {}
