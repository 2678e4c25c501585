CREATE TABLE "audit" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"person_id" uuid,
	"tablet" text DEFAULT '' NOT NULL,
	"action" text NOT NULL,
	"subject" text DEFAULT '' NOT NULL,
	"details" jsonb DEFAULT '{}'::jsonb NOT NULL,
	CONSTRAINT "audit_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "audit" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "blobs" (
	"shop_id" uuid NOT NULL,
	"sha256" text NOT NULL,
	"bytes" integer NOT NULL,
	"tablet" text NOT NULL,
	"received_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "blobs_shop_id_sha256_pk" PRIMARY KEY("shop_id","sha256")
);
--> statement-breakpoint
ALTER TABLE "blobs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "walk_blobs" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"sha256" text NOT NULL,
	CONSTRAINT "walk_blobs_shop_id_walk_id_sha256_pk" PRIMARY KEY("shop_id","walk_id","sha256")
);
--> statement-breakpoint
ALTER TABLE "walk_blobs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "confirmations" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"seq" integer NOT NULL,
	"nth" integer NOT NULL,
	"hash" text NOT NULL,
	"person_id" uuid NOT NULL,
	"meaning" text NOT NULL,
	"result" text NOT NULL,
	"reason" text,
	"at" timestamp (3) with time zone NOT NULL,
	"jws" text NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "confirmations_shop_id_walk_id_branch_seq_nth_pk" PRIMARY KEY("shop_id","walk_id","branch","seq","nth")
);
--> statement-breakpoint
ALTER TABLE "confirmations" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "pin_uses" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"seq" integer NOT NULL,
	"meaning" text NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"tablet" text NOT NULL,
	"answer" text,
	"answered_at" timestamp (3) with time zone,
	CONSTRAINT "pin_uses_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "pin_uses" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "pin_failures" (
	"shop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"place" text NOT NULL,
	"count" integer NOT NULL,
	"wait_until" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "pin_failures_shop_id_person_id_place_pk" PRIMARY KEY("shop_id","person_id","place")
);
--> statement-breakpoint
ALTER TABLE "pin_failures" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "sign_in_failures" (
	"shop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"count" integer NOT NULL,
	"wait_until" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "sign_in_failures_shop_id_person_id_pk" PRIMARY KEY("shop_id","person_id")
);
--> statement-breakpoint
ALTER TABLE "sign_in_failures" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "job_joints" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"procedure_code" text NOT NULL,
	"purpose" text DEFAULT 'finalAssembly' NOT NULL,
	"bank" text DEFAULT '' NOT NULL,
	"casting_number" text DEFAULT '' NOT NULL,
	"retired" boolean DEFAULT false NOT NULL,
	"earlier" jsonb DEFAULT '{"readingsTaken":false,"usedHoles":[]}'::jsonb NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "job_joints_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "job_joints" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "jobs" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text NOT NULL,
	"customer" text DEFAULT '' NOT NULL,
	"engine_family" text DEFAULT '' NOT NULL,
	"engine_model" text DEFAULT '' NOT NULL,
	"engine_serial" text DEFAULT '' NOT NULL,
	"vin" text DEFAULT '' NOT NULL,
	"claim" text DEFAULT '' NOT NULL,
	"odometer" jsonb,
	"hours" text,
	"state" text DEFAULT 'open' NOT NULL,
	"created_by" uuid,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"changed_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	"search" text GENERATED ALWAYS AS (lower(number || ' ' || customer || ' ' || engine_family || ' ' || engine_model || ' ' || engine_serial || ' ' || vin || ' ' || claim)) STORED,
	CONSTRAINT "jobs_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "jobs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "orders" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"deviation" text,
	"choice" text,
	"pass" text,
	"branch" integer,
	"reason" text NOT NULL,
	"by_person" uuid NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"jws" text NOT NULL,
	"state" text NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "orders_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "orders" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "outbox" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"kind" text NOT NULL,
	"payload" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"next_at" timestamp (3) with time zone NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"done_at" timestamp (3) with time zone,
	"error" text,
	CONSTRAINT "outbox_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "outbox" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "people" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"email" text,
	"password_hash" text,
	"roles" text[] NOT NULL,
	"state" text DEFAULT 'active' NOT NULL,
	"left_at" timestamp (3) with time zone,
	"pin_version" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "people_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "people" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "person_roles" (
	"shop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"since" bigint NOT NULL,
	"roles" text[] NOT NULL,
	"state" text NOT NULL,
	CONSTRAINT "person_roles_shop_id_person_id_since_pk" PRIMARY KEY("shop_id","person_id","since")
);
--> statement-breakpoint
ALTER TABLE "person_roles" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "pins" (
	"shop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"hash" text NOT NULL,
	"set_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "pins_shop_id_person_id_version_pk" PRIMARY KEY("shop_id","person_id","version")
);
--> statement-breakpoint
ALTER TABLE "pins" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "procedure_revisions" (
	"shop_id" uuid NOT NULL,
	"procedure_id" uuid NOT NULL,
	"revision" integer NOT NULL,
	"hash" text NOT NULL,
	"document" jsonb NOT NULL,
	"state" text NOT NULL,
	"written_by" uuid NOT NULL,
	"written_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"approved_by" uuid,
	"approved_at" timestamp (3) with time zone,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "procedure_revisions_shop_id_procedure_id_revision_pk" PRIMARY KEY("shop_id","procedure_id","revision")
);
--> statement-breakpoint
ALTER TABLE "procedure_revisions" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "procedures" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"code" text NOT NULL,
	"title" text NOT NULL,
	"engine" text DEFAULT '' NOT NULL,
	"component" text DEFAULT '' NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "procedures_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "procedures" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "ledger" (
	"shop_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"head_hash" text NOT NULL,
	"prev" text NOT NULL,
	"text" text NOT NULL,
	"hash" text NOT NULL,
	"sig" text NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "ledger_shop_id_seq_pk" PRIMARY KEY("shop_id","seq")
);
--> statement-breakpoint
ALTER TABLE "ledger" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "proofs" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text NOT NULL,
	"issue" integer NOT NULL,
	"state" text NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"head_hash" text NOT NULL,
	"issued_at" timestamp (3) with time zone NOT NULL,
	"issued_by" uuid NOT NULL,
	"jws" text NOT NULL,
	"fingerprint" text NOT NULL,
	"public_token" text NOT NULL,
	"revoked_at" timestamp (3) with time zone,
	"revoked_reason" text,
	"job_number" text DEFAULT '' NOT NULL,
	"customer" text DEFAULT '' NOT NULL,
	"engine_serial" text DEFAULT '' NOT NULL,
	"vin" text DEFAULT '' NOT NULL,
	"claim" text DEFAULT '' NOT NULL,
	"procedure_code" text DEFAULT '' NOT NULL,
	"search" text GENERATED ALWAYS AS (lower(number || ' ' || job_number || ' ' || customer || ' ' || engine_serial || ' ' || vin || ' ' || claim || ' ' || procedure_code)) STORED,
	CONSTRAINT "proofs_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "proofs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "sessions" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"token_hash" text NOT NULL,
	"person_id" uuid NOT NULL,
	"csrf" text NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"ended_at" timestamp (3) with time zone,
	CONSTRAINT "sessions_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "sessions" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "shop_keys" (
	"shop_id" uuid NOT NULL,
	"kid" text NOT NULL,
	"purpose" text NOT NULL,
	"public_jwk" jsonb NOT NULL,
	"private_sealed" text NOT NULL,
	"state" text DEFAULT 'active' NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shop_keys_shop_id_kid_pk" PRIMARY KEY("shop_id","kid")
);
--> statement-breakpoint
ALTER TABLE "shop_keys" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "shop_counters" (
	"shop_id" uuid NOT NULL,
	"name" text NOT NULL,
	"value" bigint NOT NULL,
	CONSTRAINT "shop_counters_shop_id_name_pk" PRIMARY KEY("shop_id","name")
);
--> statement-breakpoint
ALTER TABLE "shop_counters" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "shop_policies" (
	"shop_id" uuid NOT NULL,
	"since" bigint NOT NULL,
	"settings" jsonb NOT NULL,
	CONSTRAINT "shop_policies_shop_id_since_pk" PRIMARY KEY("shop_id","since")
);
--> statement-breakpoint
ALTER TABLE "shop_policies" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "shops" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"prefix" text NOT NULL,
	"time_zone" text NOT NULL,
	"settings" jsonb NOT NULL,
	"epoch" uuid DEFAULT gen_random_uuid() NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL
);
--> statement-breakpoint
ALTER TABLE "shops" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "enrolment_codes" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"code_hash" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"created_by" uuid,
	"created_at" timestamp (3) with time zone NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"used_at" timestamp (3) with time zone,
	"used_by" uuid,
	CONSTRAINT "enrolment_codes_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "enrolment_codes" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "tablets" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"kid" text NOT NULL,
	"public_jwk" jsonb NOT NULL,
	"state" text DEFAULT 'active' NOT NULL,
	"enrolled_at" timestamp (3) with time zone NOT NULL,
	"seen_at" timestamp (3) with time zone,
	"revoked_at" timestamp (3) with time zone,
	"revoked_reason" text DEFAULT '' NOT NULL,
	"report" jsonb,
	CONSTRAINT "tablets_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "tablets" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "branch_choices" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"nth" integer NOT NULL,
	"branch" integer NOT NULL,
	"by_person" uuid NOT NULL,
	"reason" text NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "branch_choices_shop_id_walk_id_nth_pk" PRIMARY KEY("shop_id","walk_id","nth")
);
--> statement-breakpoint
ALTER TABLE "branch_choices" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "quarantine_settlings" (
	"shop_id" uuid NOT NULL,
	"hash" text NOT NULL,
	"by_person" uuid NOT NULL,
	"reason" text NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "quarantine_settlings_shop_id_hash_pk" PRIMARY KEY("shop_id","hash")
);
--> statement-breakpoint
ALTER TABLE "quarantine_settlings" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "quarantined_events" (
	"shop_id" uuid NOT NULL,
	"hash" text NOT NULL,
	"walk_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"prev" text NOT NULL,
	"bytes" "bytea" NOT NULL,
	"sig" text NOT NULL,
	"tablet" text NOT NULL,
	"code" text NOT NULL,
	"details" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"received_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "quarantined_events_shop_id_hash_pk" PRIMARY KEY("shop_id","hash")
);
--> statement-breakpoint
ALTER TABLE "quarantined_events" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "walk_branches" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"from_branch" integer,
	"from_seq" integer DEFAULT -1 NOT NULL,
	"from_hash" text NOT NULL,
	"how" text NOT NULL,
	"reserved_for" text,
	"opened_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "walk_branches_shop_id_walk_id_branch_pk" PRIMARY KEY("shop_id","walk_id","branch")
);
--> statement-breakpoint
ALTER TABLE "walk_branches" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "walk_events" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"seq" integer NOT NULL,
	"hash" text NOT NULL,
	"prev" text NOT NULL,
	"bytes" "bytea" NOT NULL,
	"sig" text NOT NULL,
	"type" text NOT NULL,
	"by_person" uuid NOT NULL,
	"tablet" text NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"mono" double precision NOT NULL,
	"boot" text NOT NULL,
	"known" bigint NOT NULL,
	"body" jsonb NOT NULL,
	"flags" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"received_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "walk_events_shop_id_walk_id_branch_seq_pk" PRIMARY KEY("shop_id","walk_id","branch","seq")
);
--> statement-breakpoint
ALTER TABLE "walk_events" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "deviations" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"branch" integer NOT NULL,
	"deviation" text NOT NULL,
	"seq" integer NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"kind" text NOT NULL,
	"hole" text,
	"slot" jsonb,
	"reading" integer,
	"status" text NOT NULL,
	"settlings" jsonb NOT NULL,
	CONSTRAINT "deviations_shop_id_walk_id_branch_deviation_pk" PRIMARY KEY("shop_id","walk_id","branch","deviation")
);
--> statement-breakpoint
ALTER TABLE "deviations" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "walk_hands" (
	"shop_id" uuid NOT NULL,
	"walk_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	CONSTRAINT "walk_hands_shop_id_walk_id_person_id_pk" PRIMARY KEY("shop_id","walk_id","person_id")
);
--> statement-breakpoint
ALTER TABLE "walk_hands" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "walks" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"joint_id" uuid NOT NULL,
	"purpose" text NOT NULL,
	"procedure_code" text NOT NULL,
	"revision" integer NOT NULL,
	"procedure_hash" text NOT NULL,
	"state" text NOT NULL,
	"writer" text NOT NULL,
	"branch" integer NOT NULL,
	"next_seq" integer NOT NULL,
	"head_hash" text NOT NULL,
	"pulls" uuid NOT NULL,
	"records" uuid NOT NULL,
	"shop_of_one" boolean NOT NULL,
	"opened_at" timestamp (3) with time zone NOT NULL,
	"changed_at" timestamp (3) with time zone NOT NULL,
	"readings_done" integer NOT NULL,
	"readings_due" integer NOT NULL,
	"open_deviations" integer NOT NULL,
	"readings_taken" boolean NOT NULL,
	"used_holes" jsonb NOT NULL,
	"forked" boolean DEFAULT false NOT NULL,
	"quarantined" integer DEFAULT 0 NOT NULL,
	"refused_seals" integer DEFAULT 0 NOT NULL,
	"missing_blobs" integer DEFAULT 0 NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "walks_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "walks" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "wrench_history" (
	"shop_id" uuid NOT NULL,
	"wrench_id" uuid NOT NULL,
	"since" bigint NOT NULL,
	"snapshot" jsonb NOT NULL,
	"state" text NOT NULL,
	CONSTRAINT "wrench_history_shop_id_wrench_id_since_pk" PRIMARY KEY("shop_id","wrench_id","since")
);
--> statement-breakpoint
ALTER TABLE "wrench_history" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "wrenches" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"tag" text NOT NULL,
	"snapshot" jsonb NOT NULL,
	"state" text DEFAULT 'inService' NOT NULL,
	"changed_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"changed" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "wrenches_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "wrenches" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "walk_blobs" ADD CONSTRAINT "walk_blobs_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "confirmations" ADD CONSTRAINT "confirmations_shop_id_walk_id_branch_seq_walk_events_shop_id_walk_id_branch_seq_fk" FOREIGN KEY ("shop_id","walk_id","branch","seq") REFERENCES "public"."walk_events"("shop_id","walk_id","branch","seq") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pin_uses" ADD CONSTRAINT "pin_uses_shop_id_walk_id_branch_seq_walk_events_shop_id_walk_id_branch_seq_fk" FOREIGN KEY ("shop_id","walk_id","branch","seq") REFERENCES "public"."walk_events"("shop_id","walk_id","branch","seq") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_joints" ADD CONSTRAINT "job_joints_shop_id_job_id_jobs_shop_id_id_fk" FOREIGN KEY ("shop_id","job_id") REFERENCES "public"."jobs"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "orders" ADD CONSTRAINT "orders_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "person_roles" ADD CONSTRAINT "person_roles_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pins" ADD CONSTRAINT "pins_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "procedure_revisions" ADD CONSTRAINT "procedure_revisions_shop_id_procedure_id_procedures_shop_id_id_fk" FOREIGN KEY ("shop_id","procedure_id") REFERENCES "public"."procedures"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "procedures" ADD CONSTRAINT "procedures_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "ledger" ADD CONSTRAINT "ledger_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proofs" ADD CONSTRAINT "proofs_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shop_keys" ADD CONSTRAINT "shop_keys_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "enrolment_codes" ADD CONSTRAINT "enrolment_codes_shop_id_used_by_tablets_shop_id_id_fk" FOREIGN KEY ("shop_id","used_by") REFERENCES "public"."tablets"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tablets" ADD CONSTRAINT "tablets_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "branch_choices" ADD CONSTRAINT "branch_choices_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quarantine_settlings" ADD CONSTRAINT "quarantine_settlings_shop_id_hash_quarantined_events_shop_id_hash_fk" FOREIGN KEY ("shop_id","hash") REFERENCES "public"."quarantined_events"("shop_id","hash") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walk_branches" ADD CONSTRAINT "walk_branches_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walk_events" ADD CONSTRAINT "walk_events_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deviations" ADD CONSTRAINT "deviations_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walk_hands" ADD CONSTRAINT "walk_hands_shop_id_walk_id_walks_shop_id_id_fk" FOREIGN KEY ("shop_id","walk_id") REFERENCES "public"."walks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walks" ADD CONSTRAINT "walks_shop_id_job_id_jobs_shop_id_id_fk" FOREIGN KEY ("shop_id","job_id") REFERENCES "public"."jobs"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walks" ADD CONSTRAINT "walks_shop_id_joint_id_job_joints_shop_id_id_fk" FOREIGN KEY ("shop_id","joint_id") REFERENCES "public"."job_joints"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "wrench_history" ADD CONSTRAINT "wrench_history_shop_id_wrench_id_wrenches_shop_id_id_fk" FOREIGN KEY ("shop_id","wrench_id") REFERENCES "public"."wrenches"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "wrenches" ADD CONSTRAINT "wrenches_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_at" ON "audit" USING btree ("shop_id","at");--> statement-breakpoint
CREATE INDEX "walk_blobs_sha256" ON "walk_blobs" USING btree ("shop_id","sha256");--> statement-breakpoint
CREATE INDEX "confirmations_changed" ON "confirmations" USING btree ("shop_id","changed");--> statement-breakpoint
CREATE INDEX "pin_uses_person" ON "pin_uses" USING btree ("shop_id","person_id","at");--> statement-breakpoint
CREATE INDEX "job_joints_job" ON "job_joints" USING btree ("shop_id","job_id");--> statement-breakpoint
CREATE INDEX "job_joints_changed" ON "job_joints" USING btree ("shop_id","changed");--> statement-breakpoint
CREATE UNIQUE INDEX "jobs_number" ON "jobs" USING btree ("shop_id","number");--> statement-breakpoint
CREATE INDEX "jobs_changed" ON "jobs" USING btree ("shop_id","changed");--> statement-breakpoint
CREATE INDEX "orders_walk" ON "orders" USING btree ("shop_id","walk_id");--> statement-breakpoint
CREATE INDEX "orders_changed" ON "orders" USING btree ("shop_id","changed");--> statement-breakpoint
CREATE INDEX "outbox_waiting" ON "outbox" USING btree ("shop_id","next_at") WHERE done_at is null;--> statement-breakpoint
CREATE UNIQUE INDEX "people_email" ON "people" USING btree ("shop_id",lower("email"));--> statement-breakpoint
CREATE INDEX "people_by_email" ON "people" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "procedure_revisions_hash" ON "procedure_revisions" USING btree ("shop_id","hash");--> statement-breakpoint
CREATE UNIQUE INDEX "procedures_code" ON "procedures" USING btree ("shop_id","code");--> statement-breakpoint
CREATE UNIQUE INDEX "ledger_head" ON "ledger" USING btree ("shop_id","walk_id","head_hash");--> statement-breakpoint
CREATE UNIQUE INDEX "proofs_number" ON "proofs" USING btree ("shop_id","number","issue");--> statement-breakpoint
CREATE UNIQUE INDEX "proofs_token" ON "proofs" USING btree ("shop_id","public_token");--> statement-breakpoint
CREATE INDEX "proofs_walk" ON "proofs" USING btree ("shop_id","walk_id");--> statement-breakpoint
CREATE INDEX "proofs_newest" ON "proofs" USING btree ("shop_id","issued_at");--> statement-breakpoint
CREATE UNIQUE INDEX "sessions_token" ON "sessions" USING btree ("shop_id","token_hash");--> statement-breakpoint
CREATE UNIQUE INDEX "enrolment_codes_hash" ON "enrolment_codes" USING btree ("shop_id","code_hash");--> statement-breakpoint
CREATE UNIQUE INDEX "tablets_kid" ON "tablets" USING btree ("shop_id","kid");--> statement-breakpoint
CREATE UNIQUE INDEX "quarantined_events_walk" ON "quarantined_events" USING btree ("shop_id","walk_id","seq","hash");--> statement-breakpoint
CREATE UNIQUE INDEX "walk_events_hash" ON "walk_events" USING btree ("shop_id","walk_id","hash");--> statement-breakpoint
CREATE INDEX "walks_joint" ON "walks" USING btree ("shop_id","joint_id");--> statement-breakpoint
CREATE INDEX "walks_job" ON "walks" USING btree ("shop_id","job_id");--> statement-breakpoint
CREATE INDEX "walks_changed" ON "walks" USING btree ("shop_id","changed");--> statement-breakpoint
CREATE INDEX "walks_state" ON "walks" USING btree ("shop_id","state","changed_at");--> statement-breakpoint
CREATE UNIQUE INDEX "wrenches_tag" ON "wrenches" USING btree ("shop_id","tag");--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "audit" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "blobs" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "walk_blobs" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "confirmations" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "pin_uses" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "pin_failures" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "sign_in_failures" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "job_joints" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "jobs" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "orders" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "outbox" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "people" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "person_roles" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "pins" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "procedure_revisions" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "procedures" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "ledger" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "proofs" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "sessions" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "shop_keys" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "shop_counters" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "shop_policies" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "shops" AS PERMISSIVE FOR ALL TO public USING (id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "enrolment_codes" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "tablets" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "branch_choices" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "quarantine_settlings" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "quarantined_events" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "walk_branches" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "walk_events" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "deviations" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "walk_hands" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "walks" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "wrench_history" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);--> statement-breakpoint
CREATE POLICY "shop_isolation" ON "wrenches" AS PERMISSIVE FOR ALL TO public USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid) WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);