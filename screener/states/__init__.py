"""Floor 6: a case becomes one table of lanes; every quantity behind a finding is a function of it."""
