SELECT protect_table('specification_comments');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (settled_by, settled_at) ON specification_comments TO dotside_app;--> statement-breakpoint
CREATE POLICY specification_comments_read ON specification_comments FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()));--> statement-breakpoint
CREATE POLICY specification_comments_create ON specification_comments FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND by_id = app_person_id() AND settled_by IS NULL AND app_is_buying() AND app_has_role('engineer', 'checker', 'quality')
  AND EXISTS (SELECT FROM specification_revisions r WHERE r.id = revision_id)
);--> statement-breakpoint
CREATE POLICY specification_comments_settle ON specification_comments FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('engineer', 'checker', 'quality'))
  WITH CHECK (company_id = app_company_id() AND (settled_by IS NULL OR settled_by = app_person_id()));--> statement-breakpoint
-- What was said stays as it was said; only whether it is settled moves.
SELECT freeze_rows('specification_comments', 'true', 'settled_by', 'settled_at');--> statement-breakpoint

-- Documents that are there are found by their words too. The requirement sheet is not searched.
ALTER TABLE specification_revisions NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE specification_revisions DISABLE TRIGGER USER;--> statement-breakpoint
UPDATE specification_revisions r SET
  search_text = left(coalesce((
    SELECT string_agg(word #>> '{}', ' ') FROM jsonb_path_query(d.specification, '$.**.* ? (@.type() == "string")') AS word
  ), ''), 20000),
  figures = jsonb_strip_nulls(jsonb_build_object(
    'core', d.specification #> '{core,core,value,id}',
    'inductanceH', d.specification #> '{electrical,inductance,value,nominalH}',
    'turns', d.specification #> '{windings,0,turns}',
    'windings', jsonb_array_length(d.specification -> 'windings'),
    'frequencyHz', d.specification #> '{electrical,switchingFrequencyHz,value,maximum}'
  ))
FROM (SELECT id, convert_from(document, 'UTF8')::jsonb -> 'specification' AS specification FROM specification_revisions) d
WHERE d.id = r.id;--> statement-breakpoint
ALTER TABLE specification_revisions ENABLE TRIGGER USER;--> statement-breakpoint
ALTER TABLE specification_revisions FORCE ROW LEVEL SECURITY;
