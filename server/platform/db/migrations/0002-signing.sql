-- The certificates of each time-stamp authority ever used: old stamps must verify after the authority has changed.
alter table record.tsa_roots add column chain text not null;
