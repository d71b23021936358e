"""What leaves the program to be read: the report."""
