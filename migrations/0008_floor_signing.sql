-- A reading waits for a signature that is being written, and the signature for a reading: locking only signed records,
-- as before, let a reading slip in beside the signature.
CREATE OR REPLACE FUNCTION vital_signs_keep() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  signed timestamptz;
BEGIN
  IF TG_OP = 'INSERT' THEN
    IF NEW.amends IS NULL THEN
      SELECT r.signed_at INTO signed FROM session_records r WHERE r.id = NEW.session_record_id FOR SHARE;
      IF signed IS NOT NULL THEN
        RAISE EXCEPTION 'the record is signed' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'vital_signs_record_open';
      END IF;
    END IF;
    RETURN NEW;
  END IF;
  IF TG_OP = 'DELETE' OR (to_jsonb(NEW) - 'status') IS DISTINCT FROM (to_jsonb(OLD) - 'status') THEN
    RAISE EXCEPTION 'a reading never changes' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'vital_signs_kept';
  END IF;
  RETURN NEW;
END $$;
