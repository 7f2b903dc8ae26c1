declare module '#auth-utils' {
  interface User {
    id: string
  }
  interface SecureSessionData {
    sessionId: string
    secret: string
  }
}

export {}
