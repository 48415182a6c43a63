"""One module per published standard: numbers and arrays in, numbers and arrays out."""
