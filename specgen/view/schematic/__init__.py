"""The schematic of a loop: its circuits laid out as current paths, drawn with symbols of our own after IEC 60617."""
