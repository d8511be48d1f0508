ALTER TABLE "capture" ADD COLUMN "derived" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "capture_signal" ADD COLUMN "made" text;