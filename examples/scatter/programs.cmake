# Boost.Math gives the p values. No other example needs it: without it this one is left out.

find_package(Boost QUIET)
if(TARGET Boost::headers)
    leat_add_example(scatter ${files_of_scatter})
    target_link_libraries(leat_scatter PRIVATE Boost::headers)
    target_compile_definitions(leat_scatter PRIVATE
        "LEAT_SCATTER_DIR=\"${CMAKE_CURRENT_LIST_DIR}\"")
else()
    message(STATUS "leat: no Boost, so the example scatter is left out")
endif()
