INSERT INTO outbox_health DEFAULT VALUES;--> statement-breakpoint
SELECT protect_table('outbox_health');--> statement-breakpoint
GRANT SELECT ON outbox_health TO dotside_auth, dotside_app;--> statement-breakpoint
GRANT SELECT, UPDATE ON outbox_health TO dotside_worker;--> statement-breakpoint
CREATE POLICY outbox_health_auth ON outbox_health FOR SELECT TO dotside_auth USING (true);--> statement-breakpoint
CREATE POLICY outbox_health_worker ON outbox_health TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY outbox_health_operator ON outbox_health FOR SELECT TO dotside_app USING ((SELECT app_is_operator()));
