-- What the role of the application may do with the tables of people. Absent where a deployment has one role only.
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant select, insert, update on person to hairsbreadth_app;
		grant select, insert, update, delete on
			account_link, "group", membership, session, sign_in_link, invitation, api_token, outbox, rate_counter
			to hairsbreadth_app;
		revoke delete, truncate on person from hairsbreadth_app;
	end if;
end $$;
