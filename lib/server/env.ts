/** The address under which people reach the application; links and redirects are built on it. */
export function applicationUrl(): string {
  return (process.env.AUTH_URL ?? "http://localhost:3000").replace(/\/+$/, "");
}

export const isSecure = (): boolean => applicationUrl().startsWith("https:");
