CREATE TABLE "shape_edition" (
	"workshop_id" text PRIMARY KEY NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
ALTER TABLE "comparison" ADD COLUMN "adjustment" jsonb;--> statement-breakpoint
ALTER TABLE "comparison" ADD COLUMN "edition" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "year_to" integer;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "instrument" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "probe" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "confirmed" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "wheel_pattern" text;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "supersedes" text;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "superseded_by" text;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "version" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "known_good" ADD COLUMN "words" text GENERATED ALWAYS AS (lower("known_good"."make" || ' ' || "known_good"."model" || ' ' || "known_good"."code" || ' ' || "known_good"."condition" || ' ' || "known_good"."note" || ' ' || "known_good"."instrument" || ' ' || coalesce("known_good"."wheel_pattern", ''))) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "known_good_signal" ADD COLUMN "portrait" jsonb;--> statement-breakpoint
ALTER TABLE "known_good_signal" ADD COLUMN "shape" "bytea";--> statement-breakpoint
ALTER TABLE "known_good_signal" ADD COLUMN "shape_version" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "shape_edition" ADD CONSTRAINT "shape_edition_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "comparison_workshop" ON "comparison" USING btree ("workshop_id","created_at","id");--> statement-breakpoint
CREATE INDEX "known_good_words" ON "known_good" USING gin ("words" gin_trgm_ops);--> statement-breakpoint
CREATE INDEX "known_good_signal_shape" ON "known_good_signal" USING btree ("shape_version");