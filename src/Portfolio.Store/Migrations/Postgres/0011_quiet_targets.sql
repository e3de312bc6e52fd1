-- What a target that is too busy wishes (Retry-After) holds for all that it is sent.

alter table subscription add column quiet_until bigint;
