CREATE TABLE "attempt_events" (
	"attempt_id" text NOT NULL,
	"id" text NOT NULL,
	"seq" bigint NOT NULL,
	"content" jsonb NOT NULL,
	"received_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "attempt_events_attempt_id_id_pk" PRIMARY KEY("attempt_id","id")
);
--> statement-breakpoint
CREATE TABLE "attempts" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text NOT NULL,
	"membership_id" text NOT NULL,
	"scheduled_class_id" text NOT NULL,
	"version_id" text NOT NULL,
	"late" boolean DEFAULT false NOT NULL,
	"today_note" text,
	"started_at" timestamp (3) with time zone,
	"finished_at" timestamp (3) with time zone,
	"last_event_at" timestamp (3) with time zone,
	"state" text DEFAULT 'not-started' NOT NULL,
	"state_seq" bigint DEFAULT -1 NOT NULL,
	"revision" bigint DEFAULT 0 NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text,
	"person_id" text,
	"action" text NOT NULL,
	"subject" text DEFAULT '' NOT NULL,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "class_versions" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text NOT NULL,
	"class_id" text NOT NULL,
	"content" jsonb NOT NULL,
	"published_by" text,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "gyms" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"place" text DEFAULT '' NOT NULL,
	"time_zone" text NOT NULL,
	"emergency_number" text,
	"health_interval_days" integer DEFAULT 90 NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "health_answers" (
	"id" text PRIMARY KEY NOT NULL,
	"membership_id" text NOT NULL,
	"answers" jsonb NOT NULL,
	"cleared_at" timestamp (3) with time zone,
	"limits" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "hurt_holds" (
	"id" text PRIMARY KEY NOT NULL,
	"membership_id" text NOT NULL,
	"attempt_id" text,
	"place" text NOT NULL,
	"member_cleared_at" timestamp (3) with time zone,
	"coach_cleared_at" timestamp (3) with time zone,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text NOT NULL,
	"person_id" text NOT NULL,
	"roles" jsonb NOT NULL,
	"group_name" text,
	"deactivated_at" timestamp (3) with time zone,
	"guardian_consent_at" timestamp (3) with time zone,
	"kit" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_gym_person_key" UNIQUE("gym_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "movements" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text NOT NULL,
	"slug" text NOT NULL,
	"content" jsonb NOT NULL,
	"archived_at" timestamp (3) with time zone,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "movements_gym_slug_key" UNIQUE("gym_id","slug")
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"adult" boolean DEFAULT true NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "scheduled_classes" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text NOT NULL,
	"version_id" text NOT NULL,
	"day" date NOT NULL,
	"opens_at" timestamp (3) with time zone NOT NULL,
	"closes_at" timestamp (3) with time zone NOT NULL,
	"group_name" text,
	"coach_id" text,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sign_in_sessions" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"absolute_expires_at" timestamp (3) with time zone NOT NULL,
	"gym_id" text,
	"user_agent" text DEFAULT '' NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sign_in_throttles" (
	"key" text PRIMARY KEY NOT NULL,
	"failures" integer NOT NULL,
	"last_failure_at" timestamp (3) with time zone NOT NULL,
	"blocked_until" timestamp (3) with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "attempt_events" ADD CONSTRAINT "attempt_events_attempt_id_attempts_id_fk" FOREIGN KEY ("attempt_id") REFERENCES "public"."attempts"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "attempts" ADD CONSTRAINT "attempts_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "attempts" ADD CONSTRAINT "attempts_membership_id_memberships_id_fk" FOREIGN KEY ("membership_id") REFERENCES "public"."memberships"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "attempts" ADD CONSTRAINT "attempts_scheduled_class_id_scheduled_classes_id_fk" FOREIGN KEY ("scheduled_class_id") REFERENCES "public"."scheduled_classes"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "attempts" ADD CONSTRAINT "attempts_version_id_class_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."class_versions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "class_versions" ADD CONSTRAINT "class_versions_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "class_versions" ADD CONSTRAINT "class_versions_published_by_people_id_fk" FOREIGN KEY ("published_by") REFERENCES "public"."people"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "health_answers" ADD CONSTRAINT "health_answers_membership_id_memberships_id_fk" FOREIGN KEY ("membership_id") REFERENCES "public"."memberships"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "hurt_holds" ADD CONSTRAINT "hurt_holds_membership_id_memberships_id_fk" FOREIGN KEY ("membership_id") REFERENCES "public"."memberships"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "hurt_holds" ADD CONSTRAINT "hurt_holds_attempt_id_attempts_id_fk" FOREIGN KEY ("attempt_id") REFERENCES "public"."attempts"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "movements" ADD CONSTRAINT "movements_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "scheduled_classes" ADD CONSTRAINT "scheduled_classes_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "scheduled_classes" ADD CONSTRAINT "scheduled_classes_version_id_class_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."class_versions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "scheduled_classes" ADD CONSTRAINT "scheduled_classes_coach_id_people_id_fk" FOREIGN KEY ("coach_id") REFERENCES "public"."people"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_in_sessions" ADD CONSTRAINT "sign_in_sessions_user_id_people_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."people"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_in_sessions" ADD CONSTRAINT "sign_in_sessions_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "attempt_events_order_idx" ON "attempt_events" USING btree ("attempt_id","seq");--> statement-breakpoint
CREATE INDEX "attempts_class_idx" ON "attempts" USING btree ("scheduled_class_id","membership_id");--> statement-breakpoint
CREATE INDEX "attempts_membership_idx" ON "attempts" USING btree ("membership_id","created_at");--> statement-breakpoint
CREATE INDEX "audit_entries_gym_idx" ON "audit_entries" USING btree ("gym_id","created_at");--> statement-breakpoint
CREATE INDEX "class_versions_gym_idx" ON "class_versions" USING btree ("gym_id","class_id");--> statement-breakpoint
CREATE INDEX "health_answers_membership_idx" ON "health_answers" USING btree ("membership_id","created_at");--> statement-breakpoint
CREATE INDEX "hurt_holds_membership_idx" ON "hurt_holds" USING btree ("membership_id");--> statement-breakpoint
CREATE INDEX "memberships_person_idx" ON "memberships" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "people_email_key" ON "people" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "scheduled_classes_gym_day_idx" ON "scheduled_classes" USING btree ("gym_id","day");--> statement-breakpoint
CREATE INDEX "sign_in_sessions_user_idx" ON "sign_in_sessions" USING btree ("user_id");--> statement-breakpoint
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
	RAISE EXCEPTION 'a published version is never changed';
END
$$;
--> statement-breakpoint
CREATE TRIGGER class_versions_immutable BEFORE UPDATE OF content, class_id, gym_id ON class_versions
	FOR EACH ROW EXECUTE FUNCTION refuse_change();
