"""Stage 6: solids; the only stage that loads the CAD kernel."""
