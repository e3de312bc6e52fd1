-- The audit trail is only ever appended to; each entry carries the hash of the one before.

create table audit (
  sequence  integer not null primary key check (sequence >= 1),
  at        integer not null,
  actor     text    not null,
  action    text    not null,
  object    text    not null,
  detail    text    not null,
  prev_hash text    not null check (length(prev_hash) = 64),
  hash      text    not null check (length(hash) = 64)
) strict;

create trigger audit_no_update before update on audit
begin
  select raise(abort, 'the audit trail is only ever appended to');
end;

create trigger audit_no_delete before delete on audit
begin
  select raise(abort, 'the audit trail is only ever appended to');
end;

create table outbox (
  sequence  integer not null primary key check (sequence >= 1),
  at        integer not null,
  portfolio text    not null references portfolio (id),
  kind      text    not null,
  subject   text    not null,
  payload   text    not null
) strict;

create index outbox_by_portfolio on outbox (portfolio, sequence);
