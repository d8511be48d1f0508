CREATE TABLE "answer" (
	"id" text PRIMARY KEY NOT NULL,
	"share_link_id" text NOT NULL,
	"capture_id" text NOT NULL,
	"name" text NOT NULL,
	"text" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"hidden_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "audit" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text,
	"person_id" text,
	"who" text NOT NULL,
	"action" text NOT NULL,
	"subject" text NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "capture" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"created_by" text NOT NULL,
	"title" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"job_id" text,
	"practice" boolean DEFAULT false NOT NULL,
	"status" text DEFAULT 'queued' NOT NULL,
	"progress" real DEFAULT 0 NOT NULL,
	"error" jsonb,
	"revision" integer DEFAULT 1 NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"samples_version" integer DEFAULT 0 NOT NULL,
	"axis" jsonb,
	"samples" bigint DEFAULT 0 NOT NULL,
	"sha256" text NOT NULL,
	"bytes" bigint NOT NULL,
	"file_name" text NOT NULL,
	"original_key" text NOT NULL,
	"cylinders" integer,
	"signal_requests" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"hints" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"reading" jsonb,
	"preview" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "capture_signal" (
	"capture_id" text NOT NULL,
	"index" integer NOT NULL,
	"column" integer NOT NULL,
	"name" text NOT NULL,
	"circuit" text NOT NULL,
	"circuit_confidence" real NOT NULL,
	"circuit_because" text DEFAULT '' NOT NULL,
	"unit" text NOT NULL,
	"factor" double precision DEFAULT 1 NOT NULL,
	"offset" double precision DEFAULT 0 NOT NULL,
	"rail" jsonb,
	CONSTRAINT "capture_signal_capture_id_index_pk" PRIMARY KEY("capture_id","index")
);
--> statement-breakpoint
CREATE TABLE "comparison" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"created_by" text NOT NULL,
	"capture_id" text NOT NULL,
	"request" jsonb NOT NULL,
	"status" text DEFAULT 'queued' NOT NULL,
	"error" text,
	"result" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "idempotency" (
	"id" text PRIMARY KEY NOT NULL,
	"content_hash" text NOT NULL,
	"state" text NOT NULL,
	"status" integer,
	"body" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "known_good" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"created_by" text NOT NULL,
	"capture_id" text,
	"state" text DEFAULT 'proposed' NOT NULL,
	"make" text NOT NULL,
	"model" text NOT NULL,
	"code" text DEFAULT '' NOT NULL,
	"year" integer,
	"cylinders" integer,
	"condition" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"provenance" text NOT NULL,
	"from_s" double precision NOT NULL,
	"to_s" double precision NOT NULL,
	"axis" jsonb NOT NULL,
	"engine_version" text NOT NULL,
	"findings" jsonb NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"published_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "known_good_review" (
	"id" text PRIMARY KEY NOT NULL,
	"known_good_id" text NOT NULL,
	"reviewer_id" text NOT NULL,
	"decision" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "known_good_signal" (
	"known_good_id" text NOT NULL,
	"index" integer NOT NULL,
	"name" text NOT NULL,
	"circuit" text NOT NULL,
	"unit" text NOT NULL,
	"factor" double precision NOT NULL,
	"offset" double precision NOT NULL,
	CONSTRAINT "known_good_signal_known_good_id_index_pk" PRIMARY KEY("known_good_id","index")
);
--> statement-breakpoint
CREATE TABLE "mark" (
	"id" text PRIMARY KEY NOT NULL,
	"capture_id" text NOT NULL,
	"created_by" text,
	"author" text NOT NULL,
	"answer_id" text,
	"kind" text NOT NULL,
	"signal" integer,
	"from_s" double precision NOT NULL,
	"to_s" double precision,
	"value" double precision,
	"text" text NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "measurement" (
	"capture_id" text PRIMARY KEY NOT NULL,
	"revision" integer NOT NULL,
	"samples_version" integer NOT NULL,
	"engine" text NOT NULL,
	"signals" jsonb NOT NULL,
	"relations" jsonb NOT NULL,
	"wheel" jsonb,
	"measured_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "membership" (
	"person_id" text NOT NULL,
	"workshop_id" text NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "membership_person_id_workshop_id_pk" PRIMARY KEY("person_id","workshop_id")
);
--> statement-breakpoint
CREATE TABLE "person" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"current_workshop_id" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "rate_limit" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "session" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "share_link" (
	"id" text PRIMARY KEY NOT NULL,
	"capture_id" text NOT NULL,
	"created_by" text NOT NULL,
	"secret_hash" text NOT NULL,
	"question" text DEFAULT '' NOT NULL,
	"may_answer" boolean DEFAULT true NOT NULL,
	"seen" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "token" (
	"id" text PRIMARY KEY NOT NULL,
	"person_id" text NOT NULL,
	"workshop_id" text NOT NULL,
	"name" text NOT NULL,
	"hash" text NOT NULL,
	"scopes" text[] NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"last_used_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "upload" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"person_id" text NOT NULL,
	"length" bigint NOT NULL,
	"metadata" jsonb NOT NULL,
	"capture_id" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"finished_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "workshop" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"time_zone" text DEFAULT 'Etc/UTC' NOT NULL,
	"demo" boolean DEFAULT false NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "answer" ADD CONSTRAINT "answer_share_link_id_share_link_id_fk" FOREIGN KEY ("share_link_id") REFERENCES "public"."share_link"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "answer" ADD CONSTRAINT "answer_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit" ADD CONSTRAINT "audit_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit" ADD CONSTRAINT "audit_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "capture" ADD CONSTRAINT "capture_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "capture" ADD CONSTRAINT "capture_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "capture_signal" ADD CONSTRAINT "capture_signal_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparison" ADD CONSTRAINT "comparison_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparison" ADD CONSTRAINT "comparison_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparison" ADD CONSTRAINT "comparison_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "known_good" ADD CONSTRAINT "known_good_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "known_good" ADD CONSTRAINT "known_good_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "known_good_review" ADD CONSTRAINT "known_good_review_reviewer_id_person_id_fk" FOREIGN KEY ("reviewer_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "known_good_review" ADD CONSTRAINT "known_good_review_known_good_id_known_good_id_fk" FOREIGN KEY ("known_good_id") REFERENCES "public"."known_good"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "known_good_signal" ADD CONSTRAINT "known_good_signal_known_good_id_known_good_id_fk" FOREIGN KEY ("known_good_id") REFERENCES "public"."known_good"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mark" ADD CONSTRAINT "mark_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mark" ADD CONSTRAINT "mark_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measurement" ADD CONSTRAINT "measurement_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "person" ADD CONSTRAINT "person_current_workshop_id_workshop_id_fk" FOREIGN KEY ("current_workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session" ADD CONSTRAINT "session_user_id_person_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "share_link" ADD CONSTRAINT "share_link_capture_id_capture_id_fk" FOREIGN KEY ("capture_id") REFERENCES "public"."capture"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "share_link" ADD CONSTRAINT "share_link_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "token" ADD CONSTRAINT "token_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "token" ADD CONSTRAINT "token_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "upload" ADD CONSTRAINT "upload_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "upload" ADD CONSTRAINT "upload_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "answer_link" ON "answer" USING btree ("share_link_id","created_at");--> statement-breakpoint
CREATE INDEX "answer_capture" ON "answer" USING btree ("capture_id","created_at");--> statement-breakpoint
CREATE INDEX "audit_workshop_at" ON "audit" USING btree ("workshop_id","at");--> statement-breakpoint
CREATE INDEX "capture_workshop_created" ON "capture" USING btree ("workshop_id","created_at","id");--> statement-breakpoint
CREATE INDEX "capture_title_trgm" ON "capture" USING gin ("title" gin_trgm_ops);--> statement-breakpoint
CREATE INDEX "capture_deleted" ON "capture" USING btree ("deleted_at") WHERE "capture"."deleted_at" is not null;--> statement-breakpoint
CREATE INDEX "capture_signal_circuit" ON "capture_signal" USING btree ("circuit");--> statement-breakpoint
CREATE INDEX "comparison_capture" ON "comparison" USING btree ("capture_id","created_at");--> statement-breakpoint
CREATE INDEX "idempotency_created" ON "idempotency" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "known_good_workshop" ON "known_good" USING btree ("workshop_id","created_at","id");--> statement-breakpoint
CREATE INDEX "known_good_engine" ON "known_good" USING btree ("workshop_id","make","model","condition");--> statement-breakpoint
CREATE INDEX "known_good_review_of" ON "known_good_review" USING btree ("known_good_id","at");--> statement-breakpoint
CREATE INDEX "known_good_signal_circuit" ON "known_good_signal" USING btree ("circuit");--> statement-breakpoint
CREATE INDEX "mark_capture" ON "mark" USING btree ("capture_id","from_s");--> statement-breakpoint
CREATE INDEX "membership_workshop" ON "membership" USING btree ("workshop_id");--> statement-breakpoint
CREATE UNIQUE INDEX "person_email" ON "person" USING btree ("email");--> statement-breakpoint
CREATE INDEX "session_person" ON "session" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "share_link_secret" ON "share_link" USING btree ("secret_hash");--> statement-breakpoint
CREATE INDEX "share_link_capture" ON "share_link" USING btree ("capture_id");--> statement-breakpoint
CREATE UNIQUE INDEX "token_hash" ON "token" USING btree ("hash");--> statement-breakpoint
CREATE INDEX "token_person" ON "token" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "upload_person" ON "upload" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "upload_created" ON "upload" USING btree ("created_at");