import pg from "pg";

/** The account that owns the tables and migrates them, and the one that serves: it owns nothing and obeys row security. */
export const ownerRole = "gainwright_owner";
export const appRole = "gainwright_app";

/** @param {string} url */
export async function connect(url) {
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: 5_000 });
  // A server that stops while we are connected must not end this process.
  client.on("error", () => undefined);
  await client.connect();
  return client;
}

/**
 * @template T
 * @param {string} url
 * @param {(client: pg.Client) => Promise<T>} work
 */
export async function withClient(url, work) {
  const client = await connect(url);
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/**
 * The same server, as `role`, in `database`.
 * @param {string} url
 * @param {{ role?: string, password?: string, database?: string }} change
 */
export function urlWith(url, { role, password, database }) {
  const changed = new URL(url);
  if (role !== undefined) changed.username = encodeURIComponent(role);
  if (password !== undefined) changed.password = encodeURIComponent(password);
  if (database !== undefined) changed.pathname = `/${encodeURIComponent(database)}`;
  return changed.href;
}

/**
 * Makes a login role, or gives an existing one this password.
 * @param {pg.Client} client
 * @param {string} role
 * @param {string} password
 */
export async function ensureRole(client, role, password) {
  const name = pg.escapeIdentifier(role);
  const { rowCount } = await client.query("select 1 from pg_roles where rolname = $1", [role]);
  const secret = pg.escapeLiteral(password);
  // To name a right of a role that exists, even to take it away, PostgreSQL before 16 wants a superuser.
  if (rowCount) await client.query(`alter role ${name} login password ${secret}`);
  else
    await client.query(
      `create role ${name} login nosuperuser nocreatedb nocreaterole noreplication nobypassrls password ${secret}`,
    );
}

/**
 * Makes a database that belongs to the owner role; false when it exists already.
 * @param {pg.Client} client
 * @param {string} database
 * @param {string} [template]
 */
export async function ensureDatabase(client, database, template = "template0") {
  const { rowCount } = await client.query("select 1 from pg_database where datname = $1", [database]);
  if (rowCount) return false;
  const [name, from] = [database, template].map((each) => pg.escapeIdentifier(each));
  await client.query(`create database ${name} template ${from} owner ${ownerRole}`);
  await client.query(`revoke connect, temporary on database ${name} from public`);
  await client.query(`grant connect on database ${name} to ${appRole}`);
  return true;
}

/**
 * Roles and one empty database on a cluster of ours.
 * @param {string} adminUrl
 * @param {string} database
 * @param {{ owner: string, app: string }} passwords
 */
export function prepareDatabase(adminUrl, database, passwords) {
  return withClient(adminUrl, async (client) => {
    await ensureRole(client, ownerRole, passwords.owner);
    await ensureRole(client, appRole, passwords.app);
    await ensureDatabase(client, database);
    return {
      ownerUrl: urlWith(adminUrl, { role: ownerRole, password: passwords.owner, database }),
      appUrl: urlWith(adminUrl, { role: appRole, password: passwords.app, database }),
    };
  });
}
