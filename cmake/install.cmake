# Installation: the headers, a CMake package and a pkg-config file.

include(GNUInstallDirs)
include(CMakePackageConfigHelpers)

set(package_dir "${CMAKE_INSTALL_DATADIR}/cmake/leat")

install(DIRECTORY include/leat DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}")
install(FILES LICENSE DESTINATION "${CMAKE_INSTALL_DATADIR}/licenses/leat")

install(TARGETS leat EXPORT leat-targets INCLUDES DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}")
install(EXPORT leat-targets NAMESPACE leat:: DESTINATION "${package_dir}")
configure_package_config_file(cmake/leat-config.cmake.in leat-config.cmake
                              INSTALL_DESTINATION "${package_dir}")
# Sequences may change with the major version: another one is refused.
write_basic_package_version_file(leat-config-version.cmake
                                 COMPATIBILITY SameMajorVersion ARCH_INDEPENDENT)
install(FILES "${CMAKE_CURRENT_BINARY_DIR}/leat-config.cmake"
              "${CMAKE_CURRENT_BINARY_DIR}/leat-config-version.cmake"
        DESTINATION "${package_dir}")

# pkg-config: paths relative to the file, so that an installed tree can be moved.
file(RELATIVE_PATH leat_pc_to_prefix
     "/prefix/${CMAKE_INSTALL_DATADIR}/pkgconfig" "/prefix")
configure_file(cmake/leat.pc.in leat.pc @ONLY)
install(FILES "${CMAKE_CURRENT_BINARY_DIR}/leat.pc"
        DESTINATION "${CMAKE_INSTALL_DATADIR}/pkgconfig")
