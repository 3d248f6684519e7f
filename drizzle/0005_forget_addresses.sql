-- An invitation is never rewritten, except that the address of a deleted account is taken out of it.
create or replace function invitation_guard() returns trigger language plpgsql as $$
begin
	if new.email = 'deleted account' and (new.*) is distinct from (old.*) then
		old.email := new.email;
		if new *= old then
			return new;
		end if;
	end if;
	if (new.id, new.secret_hash, new.email, new.role, new.group_id, new.lead, new.invited_by, new.created_at) is distinct from
		(old.id, old.secret_hash, old.email, old.role, old.group_id, old.lead, old.invited_by, old.created_at)
		or new.expires_at > old.expires_at or num_nonnulls(old.accepted_at, old.revoked_at) > 0 then
		raise exception 'An invitation is answered or taken back once and never rewritten.'
			using errcode = 'restrict_violation', constraint = 'invitation_permanent';
	end if;
	return new;
end $$;
