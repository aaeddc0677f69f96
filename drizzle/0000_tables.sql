CREATE TABLE "accounts" (
	"user_id" text NOT NULL,
	"type" text NOT NULL,
	"provider" text NOT NULL,
	"provider_account_id" text NOT NULL,
	"refresh_token" text,
	"access_token" text,
	"expires_at" integer,
	"token_type" text,
	"scope" text,
	"id_token" text,
	"session_state" text,
	CONSTRAINT "accounts_provider_provider_account_id_pk" PRIMARY KEY("provider","provider_account_id")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"session_token" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"expires" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"email" text NOT NULL,
	"email_verified" timestamp with time zone,
	"image" text,
	"role" text NOT NULL,
	"status" text DEFAULT 'invited' NOT NULL,
	"locale" text DEFAULT 'en' NOT NULL,
	"invited_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_unique" UNIQUE("email"),
	CONSTRAINT "users_role" CHECK ("users"."role" in ('adviser','communications','legal','administrator')),
	CONSTRAINT "users_status" CHECK ("users"."status" in ('invited','active','left')),
	CONSTRAINT "users_email" CHECK ("users"."email" = lower("users"."email") and length("users"."email") <= 254)
);
--> statement-breakpoint
CREATE TABLE "verification_tokens" (
	"identifier" text NOT NULL,
	"token" text NOT NULL,
	"expires" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "verification_tokens_identifier_token_pk" PRIMARY KEY("identifier","token")
);
--> statement-breakpoint
CREATE TABLE "outbreaks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"place" text NOT NULL,
	"population_persons" bigint NOT NULL,
	"currency" text NOT NULL,
	"price_year" integer NOT NULL,
	"day_zero" date NOT NULL,
	"languages" text[] NOT NULL,
	"public_names" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"profile" jsonb,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "packages" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"outbreak_id" uuid NOT NULL,
	"letter" text NOT NULL,
	"name" text NOT NULL,
	"items" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "measures" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"short_name" text NOT NULL,
	"instruction" text NOT NULL,
	"cut" jsonb NOT NULL,
	"evidence" text DEFAULT '' NOT NULL,
	"legal_basis" text DEFAULT '' NOT NULL,
	"legal_link" text DEFAULT '' NOT NULL,
	"ladder" text,
	"max_days" integer,
	"max_days_within" integer,
	"days_used" integer,
	"review_every_days" integer,
	"lead_time_days" integer DEFAULT 0 NOT NULL,
	"costs" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"public_texts" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"archived" boolean DEFAULT false NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "measures_code_unique" UNIQUE("code")
);
--> statement-breakpoint
CREATE TABLE "assessments" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"outbreak_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"title" text NOT NULL,
	"package_letters" text[] NOT NULL,
	"draws" integer DEFAULT 2000 NOT NULL,
	"seed" bigint NOT NULL,
	"horizon_days" integer DEFAULT 365 NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "frozen_assessments" (
	"assessment_id" uuid PRIMARY KEY NOT NULL,
	"input" text NOT NULL,
	"input_hash" text NOT NULL,
	"result" text NOT NULL,
	"result_hash" text NOT NULL,
	"context" text NOT NULL,
	"context_hash" text NOT NULL,
	"engine_version" text NOT NULL,
	"snapshot_version" integer NOT NULL,
	"reason" text NOT NULL,
	"frozen_by" text NOT NULL,
	"frozen_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "briefing_texts" (
	"briefing_id" uuid NOT NULL,
	"locale" text NOT NULL,
	"title" text DEFAULT '' NOT NULL,
	"title_source_hash" text,
	"paragraphs" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"authors" text[] DEFAULT '{}' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"updated_by" text,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "briefing_texts_briefing_id_locale_pk" PRIMARY KEY("briefing_id","locale")
);
--> statement-breakpoint
CREATE TABLE "briefing_versions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"briefing_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"content" text NOT NULL,
	"content_hash" text NOT NULL,
	"authors" text[] NOT NULL,
	"submitted_by" text NOT NULL,
	"submitted_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "briefings" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"number" integer NOT NULL,
	"slug" text NOT NULL,
	"assessment_id" uuid NOT NULL,
	"package_letter" text NOT NULL,
	"source_locale" text DEFAULT 'en' NOT NULL,
	"locales" text[] NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"figures" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"review_date" text,
	"version_number" integer DEFAULT 1 NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "briefings_number_unique" UNIQUE("number"),
	CONSTRAINT "briefings_slug_unique" UNIQUE("slug"),
	CONSTRAINT "briefings_state" CHECK ("briefings"."state" in ('draft','figureCheck','legalReview','changesAsked','approved','scheduled','published','underCorrection','reviewDue','withdrawn','archived'))
);
--> statement-breakpoint
CREATE TABLE "reviews" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"version_id" uuid NOT NULL,
	"decision" text NOT NULL,
	"reviewer" text NOT NULL,
	"reviewer_name" text NOT NULL,
	"reviewer_role" text NOT NULL,
	"checklist" jsonb NOT NULL,
	"comment" text DEFAULT '' NOT NULL,
	"statement" text NOT NULL,
	"content_hash" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "reviews_decision" CHECK ("reviews"."decision" in ('signed','returned'))
);
--> statement-breakpoint
CREATE TABLE "signature_voids" (
	"review_id" uuid PRIMARY KEY NOT NULL,
	"reason" text NOT NULL,
	"voided_by" text NOT NULL,
	"at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "publications" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"release_id" uuid NOT NULL,
	"locale" text NOT NULL,
	"title" text NOT NULL,
	"content" text NOT NULL,
	"content_hash" text NOT NULL
);
--> statement-breakpoint
CREATE TABLE "release_events" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"release_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"notice" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"by_release_id" uuid,
	"actor" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "release_events_kind" CHECK ("release_events"."kind" in ('superseded','corrected','withdrawn'))
);
--> statement-breakpoint
CREATE TABLE "releases" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"briefing_id" uuid NOT NULL,
	"version_id" uuid NOT NULL,
	"outbreak_id" uuid NOT NULL,
	"slug" text NOT NULL,
	"number" integer NOT NULL,
	"kind" text NOT NULL,
	"correction" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"urgency" text NOT NULL,
	"assessment_hash" text NOT NULL,
	"content_hash" text NOT NULL,
	"published_by" text NOT NULL,
	"published_at" timestamp with time zone NOT NULL,
	CONSTRAINT "releases_version_id_unique" UNIQUE("version_id"),
	CONSTRAINT "releases_kind" CHECK ("releases"."kind" in ('first','update','correction')),
	CONSTRAINT "releases_urgency" CHECK ("releases"."urgency" in ('urgent','routine'))
);
--> statement-breakpoint
CREATE TABLE "deliveries" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"release_id" uuid,
	"subscription_id" uuid,
	"recipient" text,
	"locale" text NOT NULL,
	"payload" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"next_at" timestamp with time zone DEFAULT now() NOT NULL,
	"lease_token" uuid,
	"lease_until" timestamp with time zone,
	"message_id" text,
	"reply" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"finished_at" timestamp with time zone,
	CONSTRAINT "deliveries_state" CHECK ("deliveries"."state" in ('queued','sending','accepted','deferred','rejected','unknown','suppressed')),
	CONSTRAINT "deliveries_kind" CHECK ("deliveries"."kind" in ('signIn','invitation','confirmSubscription','briefing'))
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer NOT NULL,
	"window_ends" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "subscriptions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"locale" text NOT NULL,
	"state" text DEFAULT 'pending' NOT NULL,
	"consent_text" text NOT NULL,
	"method" text DEFAULT 'form' NOT NULL,
	"requested_at" timestamp with time zone NOT NULL,
	"confirmed_at" timestamp with time zone,
	"left_at" timestamp with time zone,
	"confirm_token_hash" text,
	"confirm_expires" timestamp with time zone,
	"suppressed_at" timestamp with time zone,
	CONSTRAINT "subscriptions_state" CHECK ("subscriptions"."state" in ('pending','active','left')),
	CONSTRAINT "subscriptions_active_confirmed" CHECK ("subscriptions"."state" <> 'active' or "subscriptions"."confirmed_at" is not null)
);
--> statement-breakpoint
ALTER TABLE "accounts" ADD CONSTRAINT "accounts_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbreaks" ADD CONSTRAINT "outbreaks_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "packages" ADD CONSTRAINT "packages_outbreak_id_outbreaks_id_fk" FOREIGN KEY ("outbreak_id") REFERENCES "public"."outbreaks"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "packages" ADD CONSTRAINT "packages_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measures" ADD CONSTRAINT "measures_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "assessments" ADD CONSTRAINT "assessments_outbreak_id_outbreaks_id_fk" FOREIGN KEY ("outbreak_id") REFERENCES "public"."outbreaks"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "assessments" ADD CONSTRAINT "assessments_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "frozen_assessments" ADD CONSTRAINT "frozen_assessments_assessment_id_assessments_id_fk" FOREIGN KEY ("assessment_id") REFERENCES "public"."assessments"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "frozen_assessments" ADD CONSTRAINT "frozen_assessments_frozen_by_users_id_fk" FOREIGN KEY ("frozen_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "briefing_texts" ADD CONSTRAINT "briefing_texts_briefing_id_briefings_id_fk" FOREIGN KEY ("briefing_id") REFERENCES "public"."briefings"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "briefing_texts" ADD CONSTRAINT "briefing_texts_updated_by_users_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "briefing_versions" ADD CONSTRAINT "briefing_versions_briefing_id_briefings_id_fk" FOREIGN KEY ("briefing_id") REFERENCES "public"."briefings"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "briefing_versions" ADD CONSTRAINT "briefing_versions_submitted_by_users_id_fk" FOREIGN KEY ("submitted_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "briefings" ADD CONSTRAINT "briefings_assessment_id_frozen_assessments_assessment_id_fk" FOREIGN KEY ("assessment_id") REFERENCES "public"."frozen_assessments"("assessment_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "briefings" ADD CONSTRAINT "briefings_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reviews" ADD CONSTRAINT "reviews_version_id_briefing_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."briefing_versions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reviews" ADD CONSTRAINT "reviews_reviewer_users_id_fk" FOREIGN KEY ("reviewer") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "signature_voids" ADD CONSTRAINT "signature_voids_review_id_reviews_id_fk" FOREIGN KEY ("review_id") REFERENCES "public"."reviews"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "signature_voids" ADD CONSTRAINT "signature_voids_voided_by_users_id_fk" FOREIGN KEY ("voided_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "publications" ADD CONSTRAINT "publications_release_id_releases_id_fk" FOREIGN KEY ("release_id") REFERENCES "public"."releases"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "release_events" ADD CONSTRAINT "release_events_release_id_releases_id_fk" FOREIGN KEY ("release_id") REFERENCES "public"."releases"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "release_events" ADD CONSTRAINT "release_events_by_release_id_releases_id_fk" FOREIGN KEY ("by_release_id") REFERENCES "public"."releases"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "release_events" ADD CONSTRAINT "release_events_actor_users_id_fk" FOREIGN KEY ("actor") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "releases" ADD CONSTRAINT "releases_briefing_id_briefings_id_fk" FOREIGN KEY ("briefing_id") REFERENCES "public"."briefings"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "releases" ADD CONSTRAINT "releases_version_id_briefing_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."briefing_versions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "releases" ADD CONSTRAINT "releases_outbreak_id_outbreaks_id_fk" FOREIGN KEY ("outbreak_id") REFERENCES "public"."outbreaks"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "releases" ADD CONSTRAINT "releases_published_by_users_id_fk" FOREIGN KEY ("published_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deliveries" ADD CONSTRAINT "deliveries_release_id_releases_id_fk" FOREIGN KEY ("release_id") REFERENCES "public"."releases"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deliveries" ADD CONSTRAINT "deliveries_subscription_id_subscriptions_id_fk" FOREIGN KEY ("subscription_id") REFERENCES "public"."subscriptions"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "assessments_number" ON "assessments" USING btree ("number");--> statement-breakpoint
CREATE UNIQUE INDEX "briefing_versions_number" ON "briefing_versions" USING btree ("briefing_id","number");--> statement-breakpoint
CREATE UNIQUE INDEX "reviews_one_signature" ON "reviews" USING btree ("version_id") WHERE "reviews"."decision" = 'signed';--> statement-breakpoint
CREATE UNIQUE INDEX "publications_locale" ON "publications" USING btree ("release_id","locale");--> statement-breakpoint
CREATE UNIQUE INDEX "release_events_once" ON "release_events" USING btree ("release_id","kind");--> statement-breakpoint
CREATE UNIQUE INDEX "releases_number" ON "releases" USING btree ("briefing_id","number");--> statement-breakpoint
CREATE UNIQUE INDEX "deliveries_once" ON "deliveries" USING btree ("release_id","subscription_id") WHERE "deliveries"."release_id" is not null;--> statement-breakpoint
CREATE INDEX "deliveries_due" ON "deliveries" USING btree ("next_at") WHERE "deliveries"."state" in ('queued','deferred');--> statement-breakpoint
CREATE INDEX "deliveries_leased" ON "deliveries" USING btree ("lease_until") WHERE "deliveries"."state" = 'sending';--> statement-breakpoint
CREATE INDEX "deliveries_release" ON "deliveries" USING btree ("release_id","state");--> statement-breakpoint
CREATE UNIQUE INDEX "subscriptions_email" ON "subscriptions" USING btree ("email");--> statement-breakpoint
CREATE INDEX "subscriptions_active" ON "subscriptions" USING btree ("locale") WHERE "subscriptions"."state" = 'active';--> statement-breakpoint
CREATE UNIQUE INDEX "subscriptions_confirm" ON "subscriptions" USING btree ("confirm_token_hash") WHERE "subscriptions"."confirm_token_hash" is not null;