-- A saved version and what happened to it are never altered or deleted, whoever asks.
CREATE FUNCTION keep_for_ever() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% of % refused: a saved version is never altered or deleted', TG_OP, TG_TABLE_NAME
    USING ERRCODE = 'integrity_constraint_violation';
END;
$$;
--> statement-breakpoint
CREATE TRIGGER versions_kept BEFORE UPDATE OR DELETE ON versions
  FOR EACH ROW EXECUTE FUNCTION keep_for_ever();
--> statement-breakpoint
CREATE TRIGGER versions_not_emptied BEFORE TRUNCATE ON versions
  FOR EACH STATEMENT EXECUTE FUNCTION keep_for_ever();
--> statement-breakpoint
CREATE TRIGGER version_events_kept BEFORE UPDATE OR DELETE ON version_events
  FOR EACH ROW EXECUTE FUNCTION keep_for_ever();
--> statement-breakpoint
CREATE TRIGGER version_events_not_emptied BEFORE TRUNCATE ON version_events
  FOR EACH STATEMENT EXECUTE FUNCTION keep_for_ever();
