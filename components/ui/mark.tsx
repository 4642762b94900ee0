/** The woven mark: two axes crossing two others, over and under. */
export function Mark({ size = 24 }: Readonly<{ size?: number }>) {
  return (
    <svg aria-hidden="true" width={size} height={size} viewBox="0 0 24 24" fill="none" strokeWidth="2.4">
      <path d="M1 8h4.6M9.4 8H23" stroke="var(--axis-1)" />
      <path d="M1 16h13.6m3.8 0H23" stroke="var(--axis-2)" />
      <path d="M7.5 1v13.2m0 3.6V23" stroke="var(--axis-3)" strokeDasharray="3.4 2.4" />
      <path d="M16.5 1v5m0 4v13" stroke="var(--ink)" />
    </svg>
  );
}
