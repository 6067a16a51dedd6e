-- what to make of an assessment, as JSON; none for those made before it was computed
alter table assessment add column diagnostics varchar(1000000);
