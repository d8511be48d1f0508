CREATE TABLE "job_check" (
	"job_id" text NOT NULL,
	"check" text NOT NULL,
	"result" text NOT NULL,
	"finding" text,
	"readings" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"codes" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"capture_ids" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"stands" text DEFAULT '' NOT NULL,
	"person_id" text NOT NULL,
	"author" text NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "job_check_job_id_check_pk" PRIMARY KEY("job_id","check")
);
--> statement-breakpoint
CREATE TABLE "job_overrule" (
	"job_id" text NOT NULL,
	"cause" text NOT NULL,
	"decision" text NOT NULL,
	"why" text NOT NULL,
	"person_id" text NOT NULL,
	"author" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "job_overrule_job_id_cause_pk" PRIMARY KEY("job_id","cause")
);
--> statement-breakpoint
ALTER TABLE "job_check" ADD CONSTRAINT "job_check_job_id_job_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."job"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_check" ADD CONSTRAINT "job_check_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_overrule" ADD CONSTRAINT "job_overrule_job_id_job_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."job"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_overrule" ADD CONSTRAINT "job_overrule_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "job_overrule_job" ON "job_overrule" USING btree ("job_id");