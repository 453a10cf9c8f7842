CREATE TABLE "spectra" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"proposal_id" uuid NOT NULL,
	"name" text NOT NULL,
	"source" text DEFAULT '' NOT NULL,
	"wavelengths_nm" double precision[] NOT NULL,
	"flux_per_nm" double precision[] NOT NULL,
	"point_count" integer NOT NULL,
	"rest_low_nm" double precision NOT NULL,
	"rest_high_nm" double precision NOT NULL,
	"observed_at_redshift" double precision NOT NULL,
	"content_hash" text NOT NULL,
	"notices" jsonb NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "submission_parts" (
	"submission_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"ordinal" integer NOT NULL,
	"content" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "submission_parts_submission_id_kind_ordinal_pk" PRIMARY KEY("submission_id","kind","ordinal")
);
--> statement-breakpoint
ALTER TABLE "targets" ADD COLUMN "redshift_uncertainty" jsonb;--> statement-breakpoint
ALTER TABLE "targets" ADD COLUMN "redshift_kind" text DEFAULT 'spectroscopic' NOT NULL;--> statement-breakpoint
ALTER TABLE "spectra" ADD CONSTRAINT "spectra_proposal_id_proposals_id_fk" FOREIGN KEY ("proposal_id") REFERENCES "public"."proposals"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "spectra" ADD CONSTRAINT "spectra_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submission_parts" ADD CONSTRAINT "submission_parts_proposal_id_proposals_id_fk" FOREIGN KEY ("proposal_id") REFERENCES "public"."proposals"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "spectra_proposal" ON "spectra" USING btree ("proposal_id");--> statement-breakpoint
CREATE INDEX "submission_parts_proposal" ON "submission_parts" USING btree ("proposal_id");--> statement-breakpoint
-- What was 0 said nothing of an uncertainty.
UPDATE "targets" SET "redshift_uncertainty" = jsonb_build_object('kind', 'gaussian', 'sigma', "redshift_sigma")
WHERE "redshift_sigma" > 0;--> statement-breakpoint
ALTER TABLE "targets" DROP COLUMN "redshift_sigma";--> statement-breakpoint
-- The light of each kind in the form it has now, with every default written out.
UPDATE "targets" SET "light" = ("light" - 'spectralSlopeBeta' - 'magnitudeAb')
  || '{"hostDust": null, "galacticDust": null, "magnification": 1, "intergalactic": "inoue2014"}'::jsonb
  || CASE "light" ->> 'kind'
    WHEN 'apparentMagnitude' THEN jsonb_build_object(
      'system', coalesce("light" -> 'system', '"AB"'::jsonb),
      'spectrum', jsonb_build_object(
        'kind', 'powerLaw', 'slopeBeta', coalesce("light" -> 'spectralSlopeBeta', '-2'::jsonb), 'escapeFraction', 0),
      'includes', '{"hostDust": true, "galacticDust": true, "lensing": true}'::jsonb)
    WHEN 'absoluteMagnitude' THEN jsonb_build_object(
      'magnitude', "light" -> 'magnitudeAb',
      'system', 'AB',
      'restWavelengthNm', coalesce("light" -> 'restWavelengthNm', '150'::jsonb),
      'restBandId', null,
      'derivedWith', null,
      'spectrum', jsonb_build_object(
        'kind', 'powerLaw', 'slopeBeta', coalesce("light" -> 'spectralSlopeBeta', '-2'::jsonb), 'escapeFraction', 0),
      'includes', '{"hostDust": true, "galacticDust": false, "lensing": false}'::jsonb)
    WHEN 'lineFlux' THEN jsonb_build_object(
      'velocityWidthKmS', coalesce("light" -> 'velocityWidthKmS', '200'::jsonb),
      'continuum', null,
      'includes', '{"hostDust": true, "galacticDust": true, "lensing": true}'::jsonb)
    WHEN 'lineLuminosity' THEN jsonb_build_object(
      'velocityWidthKmS', coalesce("light" -> 'velocityWidthKmS', '200'::jsonb),
      'continuum', null,
      'derivedWith', null,
      'includes', '{"hostDust": true, "galacticDust": false, "lensing": false}'::jsonb)
  END
WHERE "light" ->> 'kind' IN ('apparentMagnitude', 'absoluteMagnitude', 'lineFlux', 'lineLuminosity');--> statement-breakpoint
-- What was computed stays as it was; what was not computed then says so until it is computed again.
UPDATE "targets" SET "computed" = "computed"
  || '{"bandMagnitudesAb": {}, "lineObservedWavelengthNm": null, "lineFluxErgSCm2": null, "referenceDataVersion": "none"}'::jsonb;--> statement-breakpoint
UPDATE "observations" SET "estimate" = "estimate" || '{"referenceDataVersion": "none"}'::jsonb
WHERE jsonb_typeof("estimate") = 'object';
