# What `cmake --install` lays down: the program, the demo scenarios and the documents.
install(TARGETS cistern RUNTIME DESTINATION ${CMAKE_INSTALL_BINDIR})
install(DIRECTORY ${CMAKE_SOURCE_DIR}/bench/scenarios/ DESTINATION ${CMAKE_INSTALL_DATADIR}/cistern/scenarios
        FILES_MATCHING PATTERN "*.toml" PATTERN "*.csv" PATTERN "*.npy" PATTERN "*.h5")
install(FILES ${CMAKE_SOURCE_DIR}/LICENSE DESTINATION ${CMAKE_INSTALL_DOCDIR})
install(DIRECTORY ${CMAKE_SOURCE_DIR}/docs/ DESTINATION ${CMAKE_INSTALL_DOCDIR} FILES_MATCHING PATTERN "*.md")
