-- The audit trail is only ever appended to; each entry carries the hash of the one before.

create table audit (
  sequence  bigint           not null primary key check (sequence >= 1),
  at        bigint           not null,
  actor     text collate "C" not null,
  action    text collate "C" not null,
  object    text collate "C" not null,
  detail    text collate "C" not null,
  prev_hash text collate "C" not null check (length(prev_hash) = 64),
  hash      text collate "C" not null check (length(hash) = 64)
);

create function audit_is_append_only() returns trigger language plpgsql as $$
begin
  raise exception 'the audit trail is only ever appended to';
end;
$$;

create trigger audit_no_update before update on audit for each row execute function audit_is_append_only();

create trigger audit_no_delete before delete on audit for each row execute function audit_is_append_only();

create trigger audit_no_truncate before truncate on audit for each statement execute function audit_is_append_only();

create table outbox (
  sequence  bigint           not null primary key check (sequence >= 1),
  at        bigint           not null,
  portfolio text collate "C" not null references portfolio (id),
  kind      text collate "C" not null,
  subject   text collate "C" not null,
  payload   text collate "C" not null
);

create index outbox_by_portfolio on outbox (portfolio, sequence);
