"""What each command does, one command a file; imported only when the command runs."""
