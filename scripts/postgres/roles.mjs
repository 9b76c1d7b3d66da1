import { psql } from './psql.mjs';

/** Owns the tables and migrates them. */
export const OWNER_ROLE = 'plimsoll_owner';
/** What the server signs in as: it owns nothing. */
export const APP_ROLE = 'plimsoll_app';

const MAKE_ROLES = `
SET client_min_messages = warning;
SELECT format('CREATE ROLE %I LOGIN', name)
  FROM unnest(ARRAY[:'owner', :'app']) AS name
 WHERE NOT EXISTS (SELECT FROM pg_roles WHERE rolname = name) \\gexec
ALTER ROLE :"owner" LOGIN PASSWORD :'ownerPassword';
ALTER ROLE :"app" LOGIN PASSWORD :'appPassword';
`;

const MAKE_DATABASE = `
SELECT format('CREATE DATABASE %I OWNER %I', :'database', :'owner')
 WHERE NOT EXISTS (SELECT FROM pg_database WHERE datname = :'database') \\gexec
REVOKE ALL ON DATABASE :"database" FROM PUBLIC;
GRANT CONNECT ON DATABASE :"database" TO :"app";
`;

/**
 * Makes the two roles where they are missing and gives them their passwords.
 * @param {string} superuserUrl
 * @param {{ owner: string, app: string }} passwords
 */
export async function ensureRoles(superuserUrl, passwords) {
  await psql(superuserUrl, MAKE_ROLES, {
    owner: OWNER_ROLE,
    app: APP_ROLE,
    ownerPassword: passwords.owner,
    appPassword: passwords.app,
  });
}

/**
 * Makes the product's database where it is missing; only the two roles may connect.
 * @param {string} superuserUrl
 * @param {string} database
 */
export async function ensureDatabase(superuserUrl, database) {
  await psql(superuserUrl, MAKE_DATABASE, { database, owner: OWNER_ROLE, app: APP_ROLE });
}

/**
 * Removes a database, ending whatever is connected to it.
 * @param {string} superuserUrl
 * @param {string} database
 */
export async function dropDatabase(superuserUrl, database) {
  await psql(superuserUrl, 'DROP DATABASE IF EXISTS :"database" WITH (FORCE);', { database });
}
