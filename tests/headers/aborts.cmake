# Runs ${program}, which must end by abort with leat's message on stderr.

cmake_minimum_required(VERSION 3.20)

execute_process(COMMAND "${program}" RESULT_VARIABLE status ERROR_VARIABLE text)
if(status EQUAL 0 OR NOT text MATCHES "^leat::wide_integer: text = \"12x\", must be")
    message(FATAL_ERROR "expected a message and an abort; status ${status}, stderr:\n${text}")
endif()
if(NOT status MATCHES "[Aa]bort")
    message(FATAL_ERROR "expected an abort, the program ended by: ${status}")
endif()
execute_process(COMMAND "${program}" sound RESULT_VARIABLE status)
if(NOT status EQUAL 0)
    message(FATAL_ERROR "the sound value was refused too: ${status}")
endif()
