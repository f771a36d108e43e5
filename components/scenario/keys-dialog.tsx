"use client";

import { Dialog } from "@/components/ui/dialog";
import { useScenario, useWorkbench } from "./provider";
import styles from "./keys.module.css";

type Entry = { keys: string[]; does: string };
const GROUPS: { title: string; entries: Entry[] }[] = [
  {
    title: "Step through the run",
    entries: [
      { keys: ["←", "→"], does: "event" },
      { keys: ["Shift", "←", "→"], does: "PWM period" },
      { keys: ["[", "]"], does: "milestone" },
      { keys: [",", "."], does: "ADC sample" },
      { keys: ["Home", "End"], does: "start, end of run" },
      { keys: ["Space"], does: "play, pause" },
    ],
  },
  {
    title: "Number field",
    entries: [
      { keys: ["↑", "↓"], does: "one step" },
      { keys: ["Shift", "↑", "↓"], does: "ten steps" },
      { keys: ["Alt", "↑", "↓"], does: "a tenth of a step" },
      { keys: ["PgUp", "PgDn"], does: "next preferred value" },
      { keys: ["Enter"], does: "take the value" },
      { keys: ["Esc"], does: "put the old one back" },
      { keys: ["Backspace"], does: "on the slider: saved value" },
    ],
  },
  {
    title: "Everywhere",
    entries: [
      { keys: ["?"], does: "this map" },
      { keys: ["Ctrl", "Z"], does: "undo" },
      { keys: ["Ctrl", "Y"], does: "redo" },
      { keys: ["Ctrl", "S"], does: "name and save this revision" },
      { keys: ["Ctrl", "Enter"], does: "run again" },
      { keys: ["Esc"], does: "cancel a long run, close" },
      { keys: ["F6"], does: "next region of the page" },
    ],
  },
  {
    title: "Cursor",
    entries: [
      { keys: ["P"], does: "pin the cursor" },
      { keys: ["Shift", "P"], does: "remove the pin" },
      { keys: ["Enter"], does: "into the lanes, then Tab" },
      { keys: ["Esc"], does: "out of the lanes" },
    ],
  },
  {
    title: "View",
    entries: [
      { keys: ["+", "−"], does: "zoom the time axis" },
      { keys: ["0"], does: "whole run" },
      { keys: ["Z"], does: "zoom to PWM period" },
      { keys: ["Ctrl", "←", "→"], does: "move the window" },
    ],
  },
];

/** Every key of the page. Single letters work in the run only, and can be switched off. */
export function KeysDialog({ onClose }: { onClose: () => void }) {
  const { store } = useWorkbench();
  const areLettersOn = useScenario((state) => state.areLettersOn);
  return (
    <Dialog
      isOpen
      size="wide"
      title="Keys"
      description="Single-letter keys work when the run has focus."
      onClose={onClose}
    >
      <label className={styles.switch}>
        <input
          type="checkbox"
          checked={areLettersOn}
          onChange={(event) => store.getState().setLetters(event.currentTarget.checked)}
        />
        Single-letter keys and the question mark are on
      </label>
      <div className={styles.groups}>
        {GROUPS.map((group) => (
          <section key={group.title} aria-label={group.title}>
            <h3>{group.title}</h3>
            <dl>
              {group.entries.map((entry) => (
                <div key={entry.does}>
                  <dt>
                    {entry.keys.map((key) => (
                      <kbd key={key}>{key}</kbd>
                    ))}
                  </dt>
                  <dd>{entry.does}</dd>
                </div>
              ))}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}
