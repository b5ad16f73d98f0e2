CREATE INDEX "datasets_newest" ON "datasets" USING btree ("created_at" DESC NULLS LAST,"id" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "runs_slot" ON "runs" USING gist ("slot");