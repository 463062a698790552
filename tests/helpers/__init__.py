"""What several tests need: the program as a user runs it, and its answer beside the truth."""
