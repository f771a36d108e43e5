/** What a person chooses; `date` is read from a date field and lasts to the end of that day, where the person is. */
export const EXPIRY_CHOICES = [
  { value: "none", label: "Never" },
  { value: "1", label: "In 1 day" },
  { value: "7", label: "In 7 days" },
  { value: "30", label: "In 30 days" },
  { value: "date", label: "On a date" },
] as const;
export type ExpiryChoice = (typeof EXPIRY_CHOICES)[number]["value"];
export type Expiry = { choice: ExpiryChoice; date: string };

export const expiryIn = (choice: ExpiryChoice): Expiry => ({ choice, date: "" });

export function readExpiry({ choice, date }: Expiry, nowMs: number): { ok: true; at: Date | null } | { ok: false; text: string } {
  if (choice === "none") return { ok: true, at: null };
  if (choice !== "date") return { ok: true, at: new Date(nowMs + Number(choice) * 86_400_000) };
  const [year, month, day] = date.split("-").map(Number);
  if (!year || !month || !day) return { ok: false, text: "Enter the last day on which the link opens." };
  const at = new Date(year, month - 1, day, 23, 59, 59);
  return at.getTime() > nowMs ? { ok: true, at } : { ok: false, text: "That day is over. Enter today or a later day." };
}

/** Date and time as the person's own clock shows them. */
export const momentWords = (at: Date) => at.toLocaleString("en-GB", { day: "numeric", month: "short", year: "numeric", hour: "2-digit", minute: "2-digit" });
