import type { Client } from 'pg';

/** Rows of these are written once: the app role may add and read, never change or remove. */
export const appendOnlyTables = [
  'audit_events',
  'audit_seals',
  'ledger_entries',
  'payment_events',
  'policies',
] as const;

/**
 * Gives the app role what it needs, table by table, so that granting again never widens what was taken away. The job
 * queue's tables have row security and no policy, which would hide every job from a role that does not own them.
 */
const GRANTS = `
DO $$
DECLARE
  app text := current_setting('plimsoll.app_role');
  append_only text[] := string_to_array(current_setting('plimsoll.append_only'), ',');
  item record;
BEGIN
  IF app = current_user THEN RETURN; END IF;
  EXECUTE format('GRANT USAGE ON SCHEMA public, graphile_worker TO %I', app);
  FOR item IN SELECT tablename FROM pg_tables WHERE schemaname = 'public' LOOP
    EXECUTE format('REVOKE ALL ON public.%I FROM PUBLIC, %I', item.tablename, app);
    IF item.tablename = ANY (append_only) THEN
      EXECUTE format('GRANT SELECT, INSERT ON public.%I TO %I', item.tablename, app);
    ELSE
      EXECUTE format('GRANT SELECT, INSERT, UPDATE, DELETE ON public.%I TO %I', item.tablename, app);
    END IF;
  END LOOP;
  FOR item IN SELECT viewname FROM pg_views WHERE schemaname = 'public' LOOP
    EXECUTE format('GRANT SELECT ON public.%I TO %I', item.viewname, app);
  END LOOP;
  EXECUTE format('GRANT USAGE ON ALL SEQUENCES IN SCHEMA public, graphile_worker TO %I', app);
  EXECUTE format('GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA graphile_worker TO %I', app);
  EXECUTE format('GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA graphile_worker TO %I', app);
  FOR item IN
    SELECT c.relname FROM pg_class c
     WHERE c.relnamespace = 'graphile_worker'::regnamespace AND c.relrowsecurity
       AND NOT EXISTS (SELECT FROM pg_policy p WHERE p.polrelid = c.oid AND p.polname = app)
  LOOP
    EXECUTE format('CREATE POLICY %I ON graphile_worker.%I TO %I USING (true) WITH CHECK (true)',
                   app, item.relname, app);
  END LOOP;
END $$`;

/**
 * @param client connected as the tables' owner
 * @param appRole the role that the server signs in as; nothing is done when that is the owner itself
 */
export async function grantToApp(client: Client, appRole: string): Promise<void> {
  await client.query('BEGIN');
  try {
    await client.query(
      `SELECT set_config('plimsoll.app_role', $1, true), set_config('plimsoll.append_only', $2, true)`,
      [appRole, appendOnlyTables.join(',')],
    );
    await client.query(GRANTS);
    await client.query('COMMIT');
  } catch (error) {
    await client.query('ROLLBACK');
    throw error;
  }
}
