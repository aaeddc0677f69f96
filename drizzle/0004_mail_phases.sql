ALTER TABLE "deliveries" DROP CONSTRAINT "deliveries_kind";--> statement-breakpoint
DROP INDEX "deliveries_once";--> statement-breakpoint
ALTER TABLE "deliveries" ADD COLUMN "ending_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "deliveries" ADD COLUMN "unknown_at" timestamp with time zone;--> statement-breakpoint
CREATE UNIQUE INDEX "deliveries_once" ON "deliveries" USING btree ("release_id","subscription_id","kind") WHERE "deliveries"."release_id" is not null;--> statement-breakpoint
ALTER TABLE "deliveries" ADD CONSTRAINT "deliveries_kind" CHECK ("deliveries"."kind" in ('signIn','invitation','confirmSubscription','briefing','withdrawal'));