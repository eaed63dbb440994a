# Installs program, library and headers, and the package that find_package(gapwright) finds.
include(CMakePackageConfigHelpers)
include(GNUInstallDirs)

set(package_folder ${CMAKE_INSTALL_LIBDIR}/cmake/gapwright)

install(TARGETS gapwright_program RUNTIME DESTINATION ${CMAKE_INSTALL_BINDIR})
install(TARGETS gapwright EXPORT gapwright_targets
        ARCHIVE DESTINATION ${CMAKE_INSTALL_LIBDIR} LIBRARY DESTINATION ${CMAKE_INSTALL_LIBDIR})
install(DIRECTORY ${PROJECT_SOURCE_DIR}/include/gapwright DESTINATION ${CMAKE_INSTALL_INCLUDEDIR})
install(EXPORT gapwright_targets NAMESPACE gapwright:: DESTINATION ${package_folder})

configure_package_config_file(${CMAKE_CURRENT_LIST_DIR}/gapwrightConfig.cmake.in
  ${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfig.cmake INSTALL_DESTINATION ${package_folder})
write_basic_package_version_file(${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfigVersion.cmake
  COMPATIBILITY SameMinorVersion)
install(FILES ${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfig.cmake
              ${CMAKE_CURRENT_BINARY_DIR}/gapwrightConfigVersion.cmake
        DESTINATION ${package_folder})
