"""`python -m fabgen` runs the command line."""

from fabgen.cli.main import main

if __name__ == "__main__":
    main()
