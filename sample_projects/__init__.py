"""Members of an invented small harbour; data only, packaged so that an installed program has them too."""
