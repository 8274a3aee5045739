# Runs Doxygen with the settings ${settings} on the headers that they name.
#
# Without ${planted} it must find nothing amiss. With ${planted}, a folder of headers, these are
# first put beside a copy of a part of ${include_dir}, at ${headers}: Doxygen must then name every
# planted fault, and not the header that is as it should be.

cmake_minimum_required(VERSION 3.20)

if(planted)
    file(REMOVE_RECURSE "${headers}")
    file(COPY "${include_dir}/leat/core" DESTINATION "${headers}/leat")
    file(COPY "${planted}" DESTINATION "${headers}/leat")
endif()

file(MAKE_DIRECTORY "${output}")
execute_process(COMMAND "${doxygen}" "${settings}"
                RESULT_VARIABLE status OUTPUT_VARIABLE text ERROR_VARIABLE text)

if(NOT planted)
    if(NOT status EQUAL 0 OR text)
        message(FATAL_ERROR "not documented (doxygen ended with status ${status}):\n${text}")
    endif()
    return()
endif()

if(status EQUAL 0)
    message(FATAL_ERROR "doxygen accepted undocumented headers:\n${text}")
endif()
foreach(fault IN ITEMS
        "no_opening.hpp:1: .*this_header_opens_with_no_comment"
        "no_docstrings.hpp:8: .*planted_class"
        "no_docstrings.hpp:17: .*planted_function"
        "no_docstrings.hpp:18: .*planted_field"
        "no_docstrings.hpp:21: .*planted_free_function"
        "no_docstrings.hpp:23: .*planted_alias"
        "no_docstrings.hpp:25: .*planted_enum"
        "no_docstrings.hpp:27: .*planted_constant"
        "no_docstrings.hpp:30: .*this_has_no_docstring" # a concept
        "no_docstrings.hpp:32: .*this_has_no_docstring" # an empty class
        "no_docstrings.hpp:34: .*LEAT_PLANTED_MACRO")
    string(REGEX MATCH "[^\n]*${fault}[^\n]*" found "${text}")
    if(NOT found)
        message(FATAL_ERROR "this fault was not found: ${fault}\n${text}")
    endif()
endforeach()
if(text MATCHES "planted/complete.hpp")
    message(FATAL_ERROR "a sound header was refused:\n${text}")
endif()
