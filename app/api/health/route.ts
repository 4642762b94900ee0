/** Alive: the process answers. It asks nothing of the database, so a database that is away gets no server restarted. */
export const GET = () => Response.json({ status: "live" });
