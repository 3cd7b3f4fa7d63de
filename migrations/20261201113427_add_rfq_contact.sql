ALTER TABLE "rfqs" ADD COLUMN "contact_name" text NOT NULL;--> statement-breakpoint
ALTER TABLE "rfqs" ADD COLUMN "contact_email" text NOT NULL;