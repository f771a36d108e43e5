import type { MemberRole } from "./table";

/**
 * The invented people of the demo; the seed makes them and the sign-in page offers them while SLACKWATER_DEMO is 1. The
 * password is no secret: it opens demo data only.
 */
export const DEMO_PASSWORD = "still between tides";
export const DEMO_WORKSPACES = { home: "Low Meadow Waterworks", away: "North Quay Cranes" } as const;

export type DemoAccount = {
  email: string;
  name: string;
  workspace: keyof typeof DEMO_WORKSPACES;
  role: MemberRole;
  alsoIn?: { workspace: keyof typeof DEMO_WORKSPACES; role: MemberRole };
};

export const DEMO_ACCOUNTS = [
  { email: "admin@lowmeadow.example.org", name: "Maren Tollow", workspace: "home", role: "admin" },
  // a lead here who only designs there: one person, two roles
  {
    email: "lead@lowmeadow.example.org",
    name: "Ilvar Quennesk",
    workspace: "home",
    role: "lead",
    alsoIn: { workspace: "away", role: "designer" },
  },
  { email: "designer@lowmeadow.example.org", name: "Tessa Arkwold", workspace: "home", role: "designer" },
  { email: "second-designer@lowmeadow.example.org", name: "Jorun Paskell", workspace: "home", role: "designer" },
  { email: "trainer@lowmeadow.example.org", name: "Odile Frammer", workspace: "home", role: "trainer" },
  { email: "student@lowmeadow.example.org", name: "Nico Wendrake", workspace: "home", role: "student" },
  { email: "admin@northquay.example.org", name: "Suna Veldmoor", workspace: "away", role: "admin" },
  { email: "designer@northquay.example.org", name: "Piet Lorrimane", workspace: "away", role: "designer" },
] as const satisfies readonly DemoAccount[];
export type DemoEmail = (typeof DEMO_ACCOUNTS)[number]["email"];
