"""Everything that imports Qt; nothing outside this package does."""
