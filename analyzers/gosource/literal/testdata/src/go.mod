module tern.example

go 1.26
