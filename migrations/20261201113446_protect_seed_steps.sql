SELECT protect_table('seed_steps');--> statement-breakpoint
GRANT SELECT, INSERT ON seed_steps TO dotside_worker;--> statement-breakpoint
CREATE POLICY seed_steps_worker ON seed_steps TO dotside_worker USING (true) WITH CHECK (true);--> statement-breakpoint

-- While a new address waits to be proved, its confirmed request opens nothing else about the person.
ALTER POLICY people_update ON people USING (EXISTS (
  SELECT FROM change_requests c
  WHERE c.person_id = people.id AND c.state = 'confirmed' AND c.decided_by = app_person_id() AND c.change ->> 'kind' IN ('roles', 'removal')
));
