"""What turns the sources into the wheel and the page. Used by build.py only; nothing of it is shipped."""
