"""The hand-over: what the engineer issues and the contractor sets, one row a finding, in the words of the site."""
