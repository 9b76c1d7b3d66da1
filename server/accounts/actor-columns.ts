/** An `Actor` from `users u`; read with every session, so it is one statement. */
export const ACTOR_COLUMNS = `
  u.id, u.email, u.display_name AS "displayName", u.medical_director AS "medicalDirector", u.student,
  ARRAY(SELECT r.role::text FROM user_roles r WHERE r.user_id = u.id ORDER BY r.role) AS roles,
  ARRAY(SELECT v.site_id::text FROM user_sites v WHERE v.user_id = u.id) AS "siteIds",
  (SELECT p.id FROM patients p WHERE p.user_id = u.id) AS "patientId"`;
