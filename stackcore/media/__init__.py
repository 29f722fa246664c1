"""What layers are made of: one model a file, behind the contract in `base`; the sourced library."""
