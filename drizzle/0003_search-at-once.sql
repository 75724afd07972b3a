DROP INDEX "projects_words";--> statement-breakpoint
CREATE INDEX "projects_words" ON "projects" USING gin ("words") WITH (fastupdate=false);