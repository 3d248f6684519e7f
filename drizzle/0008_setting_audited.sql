-- What is decided for everybody leaves its row too; what the seed remembers of itself is nobody's decision.
create constraint trigger setting_change_audited after insert or update on setting
	deferrable initially deferred for each row when (new.key = 'installation')
	execute function change_audited('setting', 'key');
--> statement-breakpoint
create constraint trigger setting_removal_audited after delete on setting
	deferrable initially deferred for each row when (old.key = 'installation')
	execute function change_audited('setting', 'key');
