declare module '#auth-utils' {
  interface SecureSessionData {
    /** Id of the session row. In the secure part, which nuxt-auth-utils never sends to the browser. */
    sessionId?: string
  }
}

export {}
