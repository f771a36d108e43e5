import { EXPIRY_CHOICES, type Expiry, type ExpiryChoice } from "./expiry";

type Props = { id: string; label: string; value: Expiry; onChange: (value: Expiry) => void; problem?: string };

/** When a link ends: one of the usual spans, or a day. */
export function ExpiryField({ id, label, value, onChange, problem }: Props) {
  const problemId = `${id}-problem`;
  const tied = { "aria-invalid": problem ? true : undefined, "aria-describedby": problem ? problemId : undefined };
  return (
    <div className="text-field">
      <span>
        <label htmlFor={id}>{label}</label>
      </span>
      <span className="flex flex-wrap gap-2">
        <select id={id} className="text-input max-w-44" value={value.choice} onChange={(event) => onChange({ ...value, choice: event.target.value as ExpiryChoice })} {...(value.choice === "date" ? {} : tied)}>
          {EXPIRY_CHOICES.map((one) => (
            <option key={one.value} value={one.value}>
              {one.label}
            </option>
          ))}
        </select>
        {value.choice === "date" && <input type="date" aria-label="Last day" className="text-input max-w-44" value={value.date} onChange={(event) => onChange({ ...value, date: event.target.value })} {...tied} />}
      </span>
      {problem && (
        <span className="problem" id={problemId} role="alert">
          {problem}
        </span>
      )}
    </div>
  );
}
