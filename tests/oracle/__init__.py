"""An outside opinion in floats: random real figures of a sheet, and what is true on them.

Shares the sheet reader with the program and nothing else.
"""
