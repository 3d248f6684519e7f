-- Which version is recommended is a stated choice: it leaves its row.
create constraint trigger dataset_recommendation_audited after update of recommended_major, recommended_minor on dataset
	deferrable initially deferred for each row
	when ((old.recommended_major, old.recommended_minor) is distinct from (new.recommended_major, new.recommended_minor))
	execute function change_audited('dataset', 'id');
