# Runs ${program}: it must end with status 0 and, if the file ${expected} exists, print its text.

cmake_minimum_required(VERSION 3.20)

execute_process(COMMAND "${program}" OUTPUT_VARIABLE printed RESULT_VARIABLE status)
if(NOT status EQUAL 0)
    message(FATAL_ERROR "${program} ended with status ${status}\n${printed}")
endif()
if(EXISTS "${expected}")
    file(READ "${expected}" text)
    if(NOT printed STREQUAL text)
        message(FATAL_ERROR "expected (${expected}):\n${text}\nprinted:\n${printed}")
    endif()
endif()
