"""The findings beside the sheet: the verdict, what was checked, what was not, and the books."""
