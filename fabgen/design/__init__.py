"""What passes between the stages: frozen records in mm, no kernel, no files."""
