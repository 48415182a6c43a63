"""Weather of a place: files, monthly means and sums, sun on planes. The only room that knows pandas and pvlib.

Nothing is imported here: pvlib takes a second, so only the modules that need it load it.
"""
