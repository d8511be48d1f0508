CREATE TABLE "webhook" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"created_by" text NOT NULL,
	"url" text NOT NULL,
	"sealed_key" text NOT NULL,
	"edition" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "webhook_delivery" (
	"id" text PRIMARY KEY NOT NULL,
	"webhook_id" text NOT NULL,
	"event" text NOT NULL,
	"payload" jsonb NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"status" integer,
	"error" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"tried_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "invitation" (
	"id" text PRIMARY KEY NOT NULL,
	"workshop_id" text NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"secret_hash" text NOT NULL,
	"invited_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "mailed_link" (
	"id" text PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"person_id" text NOT NULL,
	"email" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "outgoing_mail" (
	"id" text PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"sealed" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"not_after" timestamp with time zone NOT NULL,
	"sent_at" timestamp with time zone,
	"given_up_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "pending_sign_in" (
	"id" text PRIMARY KEY NOT NULL,
	"person_id" text NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "recovery_code" (
	"person_id" text NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "recovery_code_person_id_hash_pk" PRIMARY KEY("person_id","hash")
);
--> statement-breakpoint
CREATE TABLE "second_step" (
	"person_id" text PRIMARY KEY NOT NULL,
	"sealed" text NOT NULL,
	"confirmed_at" timestamp with time zone,
	"last_step" bigint DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "person" ADD COLUMN "muted_mail" text[] DEFAULT '{}'::text[] NOT NULL;--> statement-breakpoint
ALTER TABLE "session" ADD COLUMN "address" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "session" ADD COLUMN "agent" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "workshop" ADD COLUMN "audit_days" integer DEFAULT 730 NOT NULL;--> statement-breakpoint
ALTER TABLE "workshop" ADD COLUMN "ends_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "webhook" ADD CONSTRAINT "webhook_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "webhook" ADD CONSTRAINT "webhook_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "webhook_delivery" ADD CONSTRAINT "webhook_delivery_webhook_id_webhook_id_fk" FOREIGN KEY ("webhook_id") REFERENCES "public"."webhook"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_invited_by_person_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mailed_link" ADD CONSTRAINT "mailed_link_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pending_sign_in" ADD CONSTRAINT "pending_sign_in_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "recovery_code" ADD CONSTRAINT "recovery_code_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "second_step" ADD CONSTRAINT "second_step_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "webhook_workshop" ON "webhook" USING btree ("workshop_id");--> statement-breakpoint
CREATE INDEX "webhook_delivery_of" ON "webhook_delivery" USING btree ("webhook_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "invitation_secret" ON "invitation" USING btree ("secret_hash");--> statement-breakpoint
CREATE INDEX "invitation_workshop" ON "invitation" USING btree ("workshop_id","created_at");--> statement-breakpoint
CREATE INDEX "mailed_link_person" ON "mailed_link" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "mailed_link_expires" ON "mailed_link" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "outgoing_mail_created" ON "outgoing_mail" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "pending_sign_in_expires" ON "pending_sign_in" USING btree ("expires_at");