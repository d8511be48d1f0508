CREATE TABLE "job" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"number" integer NOT NULL,
	"created_by" text NOT NULL,
	"assignee_id" text,
	"make" text DEFAULT '' NOT NULL,
	"model" text DEFAULT '' NOT NULL,
	"year" integer,
	"engine" text DEFAULT '' NOT NULL,
	"vin" text DEFAULT '' NOT NULL,
	"plate" text DEFAULT '' NOT NULL,
	"cylinders" integer,
	"complaint" text NOT NULL,
	"codes" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"outcome" jsonb,
	"closed_at" timestamp with time zone,
	"closed_by" text,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone,
	"search" text GENERATED ALWAYS AS ('J-' || lpad(number::text, greatest(4, length(number::text)), '0') || ' ' || make || ' ' || model || ' ' || coalesce(year::text, '') || ' ' ||
        engine || ' ' || vin || ' ' || plate || ' ' || regexp_replace(plate, '[^[:alnum:]]', '', 'g') || ' ' || complaint || ' ' ||
        codes::text || ' ' || coalesce(outcome ->> 'cause', '') || ' ' || coalesce(outcome ->> 'part', '')) STORED
);
--> statement-breakpoint
CREATE TABLE "job_entry" (
	"id" text PRIMARY KEY NOT NULL,
	"job_id" text NOT NULL,
	"created_by" text NOT NULL,
	"author" text NOT NULL,
	"kind" text NOT NULL,
	"text" text DEFAULT '' NOT NULL,
	"what" text,
	"value" double precision,
	"unit" text,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "job_photo" (
	"id" text PRIMARY KEY NOT NULL,
	"job_id" text NOT NULL,
	"created_by" text NOT NULL,
	"author" text NOT NULL,
	"caption" text DEFAULT '' NOT NULL,
	"check" text,
	"content_type" text NOT NULL,
	"width" integer NOT NULL,
	"height" integer NOT NULL,
	"bytes" integer NOT NULL,
	"sha256" text NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "job" ADD CONSTRAINT "job_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job" ADD CONSTRAINT "job_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job" ADD CONSTRAINT "job_assignee_id_person_id_fk" FOREIGN KEY ("assignee_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job" ADD CONSTRAINT "job_closed_by_person_id_fk" FOREIGN KEY ("closed_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_entry" ADD CONSTRAINT "job_entry_job_id_job_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."job"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_entry" ADD CONSTRAINT "job_entry_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_photo" ADD CONSTRAINT "job_photo_job_id_job_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."job"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_photo" ADD CONSTRAINT "job_photo_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "job_workshop_number" ON "job" USING btree ("workshop_id","number");--> statement-breakpoint
CREATE INDEX "job_workshop_created" ON "job" USING btree ("workshop_id","created_at","id");--> statement-breakpoint
CREATE INDEX "job_search_trgm" ON "job" USING gin ("search" gin_trgm_ops);--> statement-breakpoint
CREATE INDEX "job_deleted" ON "job" USING btree ("deleted_at") WHERE "job"."deleted_at" is not null;--> statement-breakpoint
CREATE INDEX "job_entry_job" ON "job_entry" USING btree ("job_id","created_at");--> statement-breakpoint
CREATE INDEX "job_photo_job" ON "job_photo" USING btree ("job_id","created_at");--> statement-breakpoint
CREATE INDEX "job_photo_deleted" ON "job_photo" USING btree ("deleted_at") WHERE "job_photo"."deleted_at" is not null;--> statement-breakpoint
ALTER TABLE "capture" ADD CONSTRAINT "capture_job_id_job_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."job"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "capture_job" ON "capture" USING btree ("job_id");