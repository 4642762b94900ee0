/**
 * The published accounts of the demo team. They are made only in the private database of `npm start` and `npm run dev`,
 * or where GAINWRIGHT_DEMO_DATA asks for them.
 */
export const demoTeam = "Saltmarsh Motion";
export const demoPassword = "four coupled axes";

/** @type {readonly { name: string, email: string, role: "lead" | "engineer" | "reviewer" }[]} */
export const demoAccounts = [
  { name: "Mara Lindqvist", email: "lead@saltmarsh.example", role: "lead" },
  { name: "Jonas Okafor", email: "engineer@saltmarsh.example", role: "engineer" },
  { name: "Ines Caldeira", email: "reviewer@saltmarsh.example", role: "reviewer" },
];
