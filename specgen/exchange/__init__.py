"""Files that come and go: recordings to identify, exports."""
