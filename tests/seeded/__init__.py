"""Faults planted one at a time into a copy of the importer, to see whether its tests catch each; by hand."""
