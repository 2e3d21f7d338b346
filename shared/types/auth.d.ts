declare module '#auth-utils' {
  interface User {
    id: string
    workspaceId: string
  }
}

export {}
