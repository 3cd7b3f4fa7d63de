DROP INDEX "specification_revisions_search_idx";--> statement-breakpoint
-- Row security keeps an index on the words from being used, so they are kept short instead: each once, small letters.
ALTER TABLE specification_revisions NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE specification_revisions DISABLE TRIGGER USER;--> statement-breakpoint
UPDATE specification_revisions SET search_text = coalesce((
  SELECT string_agg(DISTINCT ' ' || word, '') FROM regexp_split_to_table(lower(search_text), '[^[:alnum:].]+') AS word WHERE word <> ''
), '');--> statement-breakpoint
ALTER TABLE specification_revisions ENABLE TRIGGER USER;--> statement-breakpoint
ALTER TABLE specification_revisions FORCE ROW LEVEL SECURITY;
