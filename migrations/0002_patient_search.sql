-- People search by any beginning: "ver oda", "obrien", "HL-20", "verne 1961", "verne 5/14/1961". Both sides are folded alike,
-- without case or accents, so that one index serves; apostrophes and hyphens may be typed or left out.
CREATE FUNCTION fold_text(source text) RETURNS text LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
RETURN replace(replace(replace(translate(
  regexp_replace(normalize(lower(source COLLATE "und-x-icu"), NFD), '[\u0300-\u036f]', '', 'g'),
  'øłđı', 'oldi'), 'ß', 'ss'), 'æ', 'ae'), 'œ', 'oe') COLLATE "und-x-icu";
--> statement-breakpoint
CREATE FUNCTION squeeze_text(source text) RETURNS text LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
RETURN regexp_replace(source COLLATE "und-x-icu", '[^[:alnum:]]+', '', 'g');
--> statement-breakpoint
-- The parts of each name and of the number, each word and the whole of it without marks, and the birth date behind an @,
-- which no typed word can hold.
CREATE FUNCTION patient_search_terms(family_name text, given_name text, record_number text, birth_date date)
RETURNS tsvector LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
RETURN (
  WITH folded AS (
    SELECT fold_text(source) AS source FROM unnest(ARRAY[family_name, given_name, record_number]) AS source
  ), year AS (
    SELECT '@' || lpad(extract(year FROM birth_date)::int::text, 4, '0') AS term
  )
  SELECT array_to_tsvector(array_agg(DISTINCT term)) FROM (
    SELECT unnest(regexp_split_to_array(source COLLATE "und-x-icu", '[^[:alnum:]]+')) FROM folded
    UNION ALL SELECT unnest(regexp_split_to_array(regexp_replace(source, '[''’.]', '', 'g') COLLATE "und-x-icu", '[^[:alnum:]]+')) FROM folded
    UNION ALL SELECT squeeze_text(unnest(regexp_split_to_array(source, '\s+'))) FROM folded
    UNION ALL SELECT squeeze_text(source) FROM folded
    UNION ALL SELECT year.term FROM year
    UNION ALL SELECT year.term || '-' || lpad(extract(month FROM birth_date)::int::text, 2, '0')
      || '-' || lpad(extract(day FROM birth_date)::int::text, 2, '0') FROM year
  ) AS terms (term) WHERE term <> ''
);
--> statement-breakpoint
-- Every word must begin something; a year or a date (month first, or ISO) may be of the birth. Nothing to search by finds nothing.
CREATE FUNCTION patient_search_query(q text) RETURNS tsquery LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
RETURN (
  SELECT coalesce(string_agg(
    CASE
      WHEN us IS NOT NULL THEN format('''@%s-%s-%s''', us[3], lpad(us[1], 2, '0'), lpad(us[2], 2, '0'))
      WHEN word ~ '^\d{4}-\d\d-\d\d$' THEN format('''@%s''', word)
      WHEN word ~ '^(19|20)\d\d$' THEN format('(''%s'':* | ''@%s'')', word, word)
      ELSE format('''%s'':*', squeeze_text(word))
    END, ' & '), '')::tsquery
  FROM (
    SELECT word, regexp_match(word, '^(\d{1,2})/(\d{1,2})/(\d{4})$') AS us
    FROM regexp_split_to_table(fold_text(q), '[\s,;]+') AS word
  ) AS words
  WHERE squeeze_text(word) <> ''
);
--> statement-breakpoint
DROP INDEX "patients_family_prefix";--> statement-breakpoint
DROP INDEX "patients_given_prefix";--> statement-breakpoint
ALTER TABLE "medications" ADD COLUMN "replaces" uuid;--> statement-breakpoint
ALTER TABLE "thresholds" ADD COLUMN "supersedes" uuid;--> statement-breakpoint
ALTER TABLE "patients" ADD COLUMN "search_terms" "tsvector" GENERATED ALWAYS AS (patient_search_terms(family_name, given_name, record_number, birth_date)) STORED;--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_replaces_medications_id_fk" FOREIGN KEY ("replaces") REFERENCES "public"."medications"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_supersedes_thresholds_id_fk" FOREIGN KEY ("supersedes") REFERENCES "public"."thresholds"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "patients_search" ON "patients" USING gin ("search_terms");