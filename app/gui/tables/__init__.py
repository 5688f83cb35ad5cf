"""The tables below the sheet: columns as data, one generic model, one view."""
