-- What the tables of the next migration need: trigram search, and a test of whole arrays for NaN and infinities.
create extension if not exists pg_trgm;
--> statement-breakpoint
create function all_finite(numbers double precision[]) returns boolean
language sql immutable parallel safe
-- NaN sorts above Infinity, so one comparison refuses both.
return numbers is null or coalesce(
	(select bool_and(x > '-Infinity'::double precision and x < 'Infinity'::double precision) from unnest(numbers) as x),
	true
);
