namespace ArrayWatch.Messaging.Connection;

/// <summary>Finds the password.</summary>
internal static class Credentials
{
    /// <exception cref="MessagingStartException">The file cannot be read.</exception>
    public static string? Password(MqttOptions options)
    {
        if (options.Password is not null || options.PasswordFile is null) return options.Password;
        try
        {
            return File.ReadAllText(options.PasswordFile).TrimEnd('\r', '\n');
        }
        catch (Exception exception) when (exception is IOException or UnauthorizedAccessException or ArgumentException or NotSupportedException)
        {
            throw new MessagingStartException(
                $"The password file '{options.PasswordFile}' (broker.passwordFile) cannot be read: {exception.Message} Make it readable for this user.", exception);
        }
    }
}
