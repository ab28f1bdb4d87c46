using System.Diagnostics;
using System.Net;
using System.Net.Sockets;

namespace PoleField.Tests.Common;

/// <summary>A headless browser that visits a page over HTTP.</summary>
internal static class Chromium
{
    public const string Path = "/usr/bin/chromium";

    private static readonly string[] Quiet =
    [
        "--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking",
        "--disable-component-update", "--disable-sync", "--enable-logging=stderr",
    ];

    /// <summary>What became of a visit: the document as the browser made it, its log, and the paths it asked the server for.</summary>
    public sealed record Visit(string Document, string Log, IReadOnlyList<string> Requests);

    /// <summary>Serves one page, opens it, and waits until it has loaded.</summary>
    public static async Task<Visit> Open(byte[] page, params string[] options)
    {
        string profile = Directory.CreateTempSubdirectory("polefield-browser").FullName;
        int port = FreePort();
        using HttpListener server = new();
        server.Prefixes.Add($"http://127.0.0.1:{port}/");
        server.Start();
        List<string> requests = [];
        Task serving = Serve(server, page, requests);
        try
        {
            ProcessStartInfo start = new(Path) { RedirectStandardOutput = true, RedirectStandardError = true };
            foreach (string argument in (string[])[.. Quiet, "--user-data-dir=" + profile, .. options, "--dump-dom", $"http://127.0.0.1:{port}/report.html"])
            {
                start.ArgumentList.Add(argument);
            }

            using Process browser = Process.Start(start)!;
            Task<string> log = browser.StandardError.ReadToEndAsync();
            string document = await browser.StandardOutput.ReadToEndAsync();
            await browser.WaitForExitAsync();
            server.Stop();
            await serving;
            return new Visit(document, await log, requests);
        }
        finally
        {
            Directory.Delete(profile, recursive: true);
        }
    }

    private static async Task Serve(HttpListener server, byte[] page, List<string> requests)
    {
        while (true)
        {
            HttpListenerContext context;
            try
            {
                context = await server.GetContextAsync();
            }
            catch (Exception e) when (e is HttpListenerException or ObjectDisposedException)
            {
                return; // stopped
            }

            requests.Add(context.Request.Url!.AbsolutePath);
            context.Response.ContentType = "text/html; charset=utf-8";
            await context.Response.OutputStream.WriteAsync(page);
            context.Response.Close();
        }
    }

    private static int FreePort()
    {
        using TcpListener probe = new(IPAddress.Loopback, 0);
        probe.Start();
        return ((IPEndPoint)probe.LocalEndpoint).Port;
    }
}

/// <summary>A fact that needs a headless browser; skipped with the reason when it is not there.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class ChromiumFactAttribute : Xunit.FactAttribute
{
    public ChromiumFactAttribute()
    {
        if (!File.Exists(Chromium.Path))
        {
            Skip = "NOT CHECKED in a browser: no Chromium here.";
        }
    }
}
