CREATE TABLE "movement_media" (
	"id" text PRIMARY KEY NOT NULL,
	"gym_id" text NOT NULL,
	"movement" text NOT NULL,
	"option" text NOT NULL,
	"kind" text NOT NULL,
	"content_type" text NOT NULL,
	"bytes" integer NOT NULL,
	"storage_key" text NOT NULL,
	"poster_key" text,
	"uploaded_by" text,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "movement_media_option_key" UNIQUE("gym_id","movement","option")
);
--> statement-breakpoint
CREATE TABLE "option_rules" (
	"id" text PRIMARY KEY NOT NULL,
	"membership_id" text NOT NULL,
	"movement" text NOT NULL,
	"option" text NOT NULL,
	"set_by" text,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "option_rules_movement_key" UNIQUE("membership_id","movement")
);
--> statement-breakpoint
ALTER TABLE "movements" DROP CONSTRAINT "movements_gym_slug_key";--> statement-breakpoint
ALTER TABLE "memberships" ADD COLUMN "kit_weights" jsonb DEFAULT '{}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "memberships" ADD COLUMN "body_notes" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "memberships" ADD COLUMN "wants_more" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "movements" ADD COLUMN "built_in" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "movement_media" ADD CONSTRAINT "movement_media_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "movement_media" ADD CONSTRAINT "movement_media_uploaded_by_people_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."people"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "option_rules" ADD CONSTRAINT "option_rules_membership_id_memberships_id_fk" FOREIGN KEY ("membership_id") REFERENCES "public"."memberships"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "option_rules" ADD CONSTRAINT "option_rules_set_by_people_id_fk" FOREIGN KEY ("set_by") REFERENCES "public"."people"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "movements" ADD CONSTRAINT "movements_gym_slug_key" UNIQUE("gym_id","slug","built_in");