@echo off
rem Runs stillpath with Java 17 or later, found by JAVA_HOME or PATH; the jar lies beside this file.
setlocal
set "JAR=%~dp0@{project.build.finalName}-cli.jar"
if not exist "%JAR%" (
    echo stillpath: %JAR% is missing; build it with: mvn -B package 1>&2
    exit /b 4
)
set "JAVA=java"
if defined JAVA_HOME if exist "%JAVA_HOME%\bin\java.exe" set "JAVA=%JAVA_HOME%\bin\java.exe"
set "MAJOR="
for /f "tokens=3" %%v in ('""%JAVA%" -version 2^>^&1 ^| findstr /c:" version ""') do if not defined MAJOR for /f "delims=.-+ tokens=1" %%m in ("%%~v") do set "MAJOR=%%m"
if not defined MAJOR (
    echo stillpath: no Java found; install Java 17 or later, or set JAVA_HOME to it 1>&2
    exit /b 4
)
if %MAJOR% LSS 17 (
    echo stillpath: Java 17 or later is needed, "%JAVA%" is Java %MAJOR%; set JAVA_HOME to a newer one 1>&2
    exit /b 4
)
"%JAVA%" -XX:+UseSerialGC -Xshare:auto -Xlog:disable -Djava.awt.headless=true -Dfile.encoding=UTF-8 -jar "%JAR%" %*
exit /b %ERRORLEVEL%
