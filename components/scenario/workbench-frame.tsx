import { SECTIONS } from "@/lib/scenario/inputs";
import styles from "./workbench.module.css";

/** The workbench before anything is known: its rules and names, nothing that moves. */
export function WorkbenchFrame() {
  return (
    <div className={styles.place}>
      <div className={styles.workbench} aria-busy="true">
        <p className="visually-hidden" role="status">
          Opening the scenario
        </p>
        <div className={styles.subhead} aria-hidden="true" />
        <div className={styles.desk} data-frame="" aria-hidden="true">
          <div className={styles.left}>
            {SECTIONS.map((section) => (
              <p key={section.id} className={styles.frameSection}>
                {section.title}
              </p>
            ))}
          </div>
          <div className={styles.middle} />
          <div className={styles.right}>
            <p className={styles.frameHead}>Figures</p>
            <p className={styles.frameHead}>Notices</p>
          </div>
        </div>
        <div className={styles.foot} aria-hidden="true" />
      </div>
    </div>
  );
}
