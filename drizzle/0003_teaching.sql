CREATE TABLE "attempt" (
	"id" text PRIMARY KEY NOT NULL,
	"exercise_id" text NOT NULL,
	"person_id" text NOT NULL,
	"version" integer NOT NULL,
	"answers" jsonb NOT NULL,
	"sure" text,
	"why" text DEFAULT '' NOT NULL,
	"marks" jsonb NOT NULL,
	"outcome" text NOT NULL,
	"judged_by" text,
	"judged_at" timestamp with time zone,
	"comment" text DEFAULT '' NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "exercise" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"created_by" text NOT NULL,
	"capture_id" text,
	"capture_sha256" text NOT NULL,
	"title" text NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "exercise_version" (
	"exercise_id" text NOT NULL,
	"version" integer NOT NULL,
	"content" jsonb NOT NULL,
	"samples_version" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "exercise_version_exercise_id_version_pk" PRIMARY KEY("exercise_id","version")
);
--> statement-breakpoint
CREATE TABLE "teaching_set" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"created_by" text NOT NULL,
	"title" text NOT NULL,
	"intro" text DEFAULT '' NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"audience" text DEFAULT 'nobody' NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "teaching_set_item" (
	"id" text PRIMARY KEY NOT NULL,
	"set_id" text NOT NULL,
	"position" integer NOT NULL,
	"kind" text NOT NULL,
	"text" text DEFAULT '' NOT NULL,
	"after_commit" boolean DEFAULT false NOT NULL,
	"capture_id" text,
	"exercise_id" text
);
--> statement-breakpoint
CREATE TABLE "teaching_set_person" (
	"set_id" text NOT NULL,
	"person_id" text NOT NULL,
	CONSTRAINT "teaching_set_person_set_id_person_id_pk" PRIMARY KEY("set_id","person_id")
);
--> statement-breakpoint
ALTER TABLE "attempt" ADD CONSTRAINT "attempt_exercise_id_exercise_id_fk" FOREIGN KEY ("exercise_id") REFERENCES "public"."exercise"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "attempt" ADD CONSTRAINT "attempt_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "attempt" ADD CONSTRAINT "attempt_judged_by_person_id_fk" FOREIGN KEY ("judged_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise" ADD CONSTRAINT "exercise_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise" ADD CONSTRAINT "exercise_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise" ADD CONSTRAINT "exercise_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise_version" ADD CONSTRAINT "exercise_version_exercise_id_exercise_id_fk" FOREIGN KEY ("exercise_id") REFERENCES "public"."exercise"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set" ADD CONSTRAINT "teaching_set_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set" ADD CONSTRAINT "teaching_set_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set_item" ADD CONSTRAINT "teaching_set_item_set_id_teaching_set_id_fk" FOREIGN KEY ("set_id") REFERENCES "public"."teaching_set"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set_item" ADD CONSTRAINT "teaching_set_item_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set_item" ADD CONSTRAINT "teaching_set_item_exercise_id_exercise_id_fk" FOREIGN KEY ("exercise_id") REFERENCES "public"."exercise"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set_person" ADD CONSTRAINT "teaching_set_person_set_id_teaching_set_id_fk" FOREIGN KEY ("set_id") REFERENCES "public"."teaching_set"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "teaching_set_person" ADD CONSTRAINT "teaching_set_person_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "attempt_once" ON "attempt" USING btree ("exercise_id","person_id");--> statement-breakpoint
CREATE INDEX "attempt_person" ON "attempt" USING btree ("person_id","created_at");--> statement-breakpoint
CREATE INDEX "exercise_workshop" ON "exercise" USING btree ("workshop_id","created_at","id");--> statement-breakpoint
CREATE INDEX "exercise_capture" ON "exercise" USING btree ("capture_id");--> statement-breakpoint
CREATE INDEX "exercise_sha256" ON "exercise" USING btree ("workshop_id","capture_sha256") WHERE "exercise"."state" = 'open';--> statement-breakpoint
CREATE INDEX "teaching_set_workshop" ON "teaching_set" USING btree ("workshop_id","created_at","id");--> statement-breakpoint
CREATE INDEX "teaching_set_item_set" ON "teaching_set_item" USING btree ("set_id","position");--> statement-breakpoint
CREATE INDEX "teaching_set_item_capture" ON "teaching_set_item" USING btree ("capture_id");--> statement-breakpoint
CREATE INDEX "teaching_set_item_exercise" ON "teaching_set_item" USING btree ("exercise_id");--> statement-breakpoint
CREATE INDEX "teaching_set_person_of" ON "teaching_set_person" USING btree ("person_id");