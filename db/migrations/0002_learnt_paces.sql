CREATE TABLE "learnt_paces" (
	"gym_id" text PRIMARY KEY NOT NULL,
	"content" jsonb NOT NULL,
	"computed_at" timestamp (3) with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "learnt_paces" ADD CONSTRAINT "learnt_paces_gym_id_gyms_id_fk" FOREIGN KEY ("gym_id") REFERENCES "public"."gyms"("id") ON DELETE cascade ON UPDATE no action;